/**
 * Reference types of the standard that join nodes of certain types only: state machines (OPC 10000-16 §4.4.15–4.4.18,
 * OPC 10000-10), history (OPC 10000-11), PubSub (OPC 10000-14 §9), argument and field descriptions (OPC 10000-3 §5.7.2,
 * §7.24–7.30), alias names (OPC 10000-17). Without this table a connection between any two Objects would be offered forty
 * types that mean nothing there. Ids are compared with the names in the published base NodeSet by a test.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findTypeDefinition } from "../address-space/browse";
import type { Node, NodeClass } from "../address-space/node";
import { standardKey, type NodeKey } from "../address-space/node-id";
import { isSubtypeOf } from "../address-space/type-hierarchy";
import type { Refusal } from "./reference-rules";

/** An end: the node's class, and a type that the node is of (an instance) or below (a type itself). */
type End = { readonly nodeClass?: readonly NodeClass[]; readonly type?: number };

export type TypedEnds = {
  readonly name: string;
  readonly source: End;
  readonly target: End;
  check(space: AddressSpace, source: Node, target: Node): Refusal | undefined;
};

/** Types used below, by name, for the test that compares them with the base NodeSet. */
export const NAMED_TYPES: Readonly<Record<number, string>> = {
  2299: "StateMachineType",
  2307: "StateType",
  2310: "TransitionType",
  2318: "HistoricalDataConfigurationType",
  8995: "TwoStateVariableType",
  2782: "ConditionType",
  14209: "PubSubConnectionType",
  14416: "PublishSubscribeType",
  14509: "PublishedDataSetType",
  15298: "DataSetWriterType",
  15306: "DataSetReaderType",
  17725: "WriterGroupType",
  17999: "ReaderGroupType",
  23455: "AliasNameType",
};

const OBJECT: readonly NodeClass[] = ["Object"];
const VARIABLE: readonly NodeClass[] = ["Variable"];
const object = (type: number): End => ({ nodeClass: OBJECT, type });

const TABLE: readonly (readonly [id: number, name: string, source: End, target: End])[] = [
  [51, "FromState", object(2310), object(2307)],
  [52, "ToState", object(2310), object(2307)],
  [53, "HasCause", object(2310), { nodeClass: ["Method"] }],
  [54, "HasEffect", object(2310), { nodeClass: ["ObjectType"], type: 2041 }],
  [117, "HasSubStateMachine", object(2307), object(2299)],
  [15112, "HasGuard", object(2310), { nodeClass: VARIABLE }],
  [56, "HasHistoricalConfiguration", { nodeClass: ["Object", "Variable"] }, object(2318)],
  [9004, "HasTrueSubState", { nodeClass: VARIABLE, type: 8995 }, { nodeClass: ["Object", "Variable"] }],
  [9005, "HasFalseSubState", { nodeClass: VARIABLE, type: 8995 }, { nodeClass: ["Object", "Variable"] }],
  [
    9006,
    "HasCondition",
    { nodeClass: ["Object", "Variable", "Method", "ObjectType", "VariableType"] },
    { nodeClass: ["Object", "ObjectType"], type: 2782 },
  ],
  [129, "HasArgumentDescription", { nodeClass: ["Method"] }, { nodeClass: VARIABLE }],
  [131, "HasOptionalInputArgumentDescription", { nodeClass: ["Method"] }, { nodeClass: VARIABLE }],
  [14476, "HasPubSubConnection", object(14416), object(14209)],
  [14936, "DataSetToWriter", object(14509), object(15298)],
  [15296, "HasDataSetWriter", object(17725), object(15298)],
  [15297, "HasDataSetReader", object(17999), object(15306)],
  [18804, "HasWriterGroup", object(14209), object(17725)],
  [18805, "HasReaderGroup", object(14209), object(17999)],
  [23469, "AliasFor", object(23455), {}],
  [32559, "HasQuantity", { nodeClass: ["Variable", "VariableType"] }, { nodeClass: OBJECT }],
  [32558, "HasEngineeringUnitDetails", { nodeClass: VARIABLE }, { nodeClass: OBJECT }],
];

export const typedEnds: ReadonlyMap<NodeKey, TypedEnds> = new Map(
  TABLE.map(([id, name, source, target]) => [
    standardKey(id),
    { name, source, target, check: makeCheck(name, source, target) },
  ]),
);

export function findTypedEnds(referenceType: NodeKey): TypedEnds | undefined {
  return typedEnds.get(referenceType);
}

function makeCheck(name: string, source: End, target: End): TypedEnds["check"] {
  return (space, from, to) => {
    const fits = isEnd(space, from, source) && isEnd(space, to, target);
    return fits ? undefined : { code: "reference.typed-ends", clause: `definition of ${name}` };
  };
}

function isEnd(space: AddressSpace, node: Node, end: End): boolean {
  if (end.nodeClass && !end.nodeClass.includes(node.nodeClass)) return false;
  if (end.type === undefined) return true;
  const type = node.nodeClass.endsWith("Type") ? node.key : findTypeDefinition(space, node.key);
  return type !== undefined && isSubtypeOf(space, type, standardKey(end.type));
}
