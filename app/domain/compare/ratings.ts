/**
 * How a change is rated, why, and by which clause. Table after OPC 11030 (UA Modelling Best Practices) §3.2 and
 * OPC 10000-3; where no clause was found the reason says that it is our inference.
 */
import type { ChangeRating } from "./change";

export type Rating = { readonly rating: ChangeRating; readonly reason: string; readonly clause: string };

function rate(rating: ChangeRating, reason: string, clause = ""): Rating {
  return { rating, reason, clause };
}

export const ratings = {
  removed: rate("breaking", "Readers that use the node no longer find it.", "OPC 11030 §3.2.16"),
  idReused: rate("breaking", "Clients that keep the NodeId now meet another node.", "OPC 11030 §3.2.16"),
  renumbered: rate("breaking", "Clients keep NodeIds; the node is lost to them.", "OPC 10000-3 §5.2.2"),
  renamed: rate("breaking", "Browse paths and generated code name the node by its BrowseName.", "OPC 11030 §3.2.17"),
  moved: rate("breaking", "Browse paths to the node no longer resolve.", "OPC 11030 §3.2.9 (by analogy)"),
  nodeClass: rate("breaking", "A NodeId stands for a node of another class.", "OPC 11030 §3.2.17"),
  mandatoryAdded: rate("breaking", "Existing instances lack a member that the type now demands.", "OPC 11030 §3.2.1"),
  optionalAdded: rate(
    "additive",
    "Instances may leave the member out; nothing that was read changes.",
    "OPC 11030 §3.2.2",
  ),
  declaredAdded: rate(
    "additive",
    "The type gains a node that no modelling rule hands on to instances.",
    "OPC 10000-3 §6.4.4",
  ),
  instanceAdded: rate("additive", "Nothing that was read changes."),
  typeAdded: rate("additive", "A new leaf type changes no existing node.", "OPC 11030 §3.2.9"),
  dataTypeAdded: rate("additive", "A new leaf DataType changes no existing node.", "OPC 11030 §3.2.10"),
  referenceTypeAdded: rate("additive", "A new leaf ReferenceType changes no existing node.", "OPC 11030 §3.2.15"),
  supertype: rate("breaking", "Members and meaning that came from the old supertype are gone.", "OPC 11030 §3.2.9"),
  typeDefinition: rate("breaking", "The node's members and meaning follow another type.", "OPC 11030 §3.2.13"),
  typeDefinitionNarrower: rate(
    "additive",
    "The new type is a subtype of the old one and demands no further member.",
    "OPC 11030 §3.2.13",
  ),
  toMandatory: rate("breaking", "Existing instances may lack the member.", "OPC 11030 §3.2.1 (inferred)"),
  toOptional: rate("breaking", "Readers can no longer rely on the member.", "OPC 10000-3 §6.4.4.2 (inferred)"),
  otherRule: rate("breaking", "Instances are made by another rule.", "OPC 10000-3 §6.4.4.2 (inferred)"),
  dataType: rate(
    "breaking",
    "Readers decode the value by its DataType, also where the new one is a subtype.",
    "OPC 11030 §3.2.12",
  ),
  valueRank: rate("breaking", "Readers rely on scalar or array, and on the dimensions.", "OPC 11030 §3.2.12"),
  unit: rate(
    "breaking",
    "The same number now means another quantity; readers that do not look at the unit are wrong.",
    "OPC 10000-8 §5.2",
  ),
  unitAdded: rate("additive", "The value keeps its meaning and now says its unit.", "OPC 10000-8 §5.3.2"),
  unitText: rate("neutral", "The unit is the same; only its text changed.", "OPC 10000-8 §5.6.3"),
  range: rate(
    "neutral",
    "The range is information for display; readers re-read it when semantics change.",
    "OPC 10000-8 §5.3.2.2",
  ),
  value: rate("neutral", "A start value or default; a server may serve another.", "OPC 10000-3 §5.6.2"),
  accessNarrowed: rate(
    "breaking",
    "Clients that read or wrote the Variable are refused (inferred).",
    "OPC 10000-3 §8.57",
  ),
  accessWidened: rate("additive", "Clients may do more than before (inferred).", "OPC 10000-3 §8.57"),
  toAbstract: rate(
    "breaking",
    "Existing instances of the type are no longer allowed (inferred).",
    "OPC 10000-3 §5.5.2",
  ),
  toConcrete: rate("additive", "Instances of the type become possible (inferred).", "OPC 10000-3 §5.5.2"),
  symmetric: rate(
    "breaking",
    "The direction of every such reference gains or loses its meaning.",
    "OPC 10000-3 §5.3.2 (inferred)",
  ),
  enumeration: rate("breaking", "Readers know a closed set of values.", "OPC 11030 §3.2.4"),
  enumerationText: rate(
    "neutral",
    "The text changed, the value and its meaning did not.",
    "OPC 11030 §3.2.7 (by analogy)",
  ),
  structure: rate(
    "breaking",
    "The content of a DataTypeDefinition must not change once provided.",
    "OPC 10000-3 §5.8.4",
  ),
  optionSet: rate("breaking", "Bits of an option set are a closed set.", "OPC 11030 §3.2.7"),
  arguments: rate("breaking", "Callers pass and expect other arguments.", "OPC 11030 §3.2.11"),
  argumentText: rate("neutral", "Only a description of an argument changed.", "OPC 11030 §3.2.11"),
  referenceAdded: rate("additive", "A further reference; nothing that was read changes (inferred)."),
  interfaceAdded: rate("additive", "The members that the interface demands are there.", "OPC 11030 §3.2.3"),
  interfaceIncomplete: rate(
    "breaking",
    "The interface demands members that existing instances lack.",
    "OPC 11030 §3.2.3",
  ),
  referenceRemoved: rate("breaking", "Clients that follow the reference no longer arrive (inferred)."),
  eventRemoved: rate(
    "neutral",
    "GeneratesEvent is optional information; look whether a reader subscribes.",
    "OPC 10000-3 §5.5.2",
  ),
  text: rate("neutral", "Only a text for people changed.", "OPC 11030 §3.2.17"),
  symbolicName: rate("neutral", "Not part of the address space; generated code changes its names.", "OPC 10000-6 §F.3"),
  releaseStatus: rate("neutral", "Says what is planned; nothing that is read changes.", "OPC 11030 §14.2"),
  permissions: rate("breaking", "Clients may be refused what they were allowed (inferred).", "OPC 10000-3 §8.55"),
  attribute: rate("neutral", "No reader depends on this attribute (inferred)."),
  rowAdded: rate("additive", "A source feeds the member from now on (inferred)."),
  rowRemoved: rate("breaking", "No source feeds the member any more; readers get no value (inferred)."),
  rowChanged: rate(
    "neutral",
    "The same member, fed or scaled in another way; look whether the values stay comparable (inferred).",
  ),
  mappingAround: rate("neutral", "Says how the values come; no node changes (inferred)."),
  requiredModelRaised: rate(
    "neutral",
    "The server must hold a later version of the required model.",
    "OPC 10000-6 §F.2",
  ),
  requiredModelAdded: rate("additive", "The server must hold one more model.", "OPC 10000-6 §F.2"),
  requiredModelDropped: rate("neutral", "The server needs one model less.", "OPC 10000-6 §F.2"),
  requiredModelLowered: rate("neutral", "An earlier version of the required model is enough.", "OPC 10000-6 §F.2"),
  modelVersion: rate("neutral", "The version names the state; it changes no node.", "OPC 10000-6 §F.2"),
} as const satisfies Record<string, Rating>;
