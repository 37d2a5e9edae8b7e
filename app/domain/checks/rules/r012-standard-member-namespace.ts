import { attributeFix } from "../fixes";
import type { Node } from "../../address-space/node";
import { OPC_UA_NAMESPACE, type NodeKey } from "../../address-space/node-id";
import { formatQualifiedName } from "../../address-space/qualified-name";
import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import type { ReportFunction } from "../finding";
import { findTypeDefinition, isKindOf, ofType } from "../lookups";
import { getChildren, getMembers, listInterfaces } from "../members";
import { clause, type NodeRule } from "../rule";
import type { NodeHead } from "../views";

const METHOD_PROPERTIES = new Set(["InputArguments", "OutputArguments"]);
const DATA_TYPE_PROPERTIES = new Set(["EnumStrings", "EnumValues", "OptionSetValues"]);
const ANALOG_PROPERTIES = new Set(["EURange", "EngineeringUnits", "InstrumentRange", "ValuePrecision"]);

export const r012: NodeRule = {
  id: "R012",
  title: "Standard members keep the standard namespace in the BrowseName",
  severity: "error",
  clause: clause(3, "§5.2.4, §6.2.7"),
  priority: 1,
  concerns: ["Object", "Variable", "Method", "ObjectType", "VariableType", "DataType"],
  needs: ["children"],
  condition:
    "A standard Property has its BrowseName in namespace 0, and a member of a type that of its declaration, whatever namespace the NodeId has.",
  why: "Clients look for 0:EURange or 0:InputArguments by browse path. Under another namespace the range, the unit or the arguments are not found.",
  check(node, ctx, report) {
    checkStandardProperties(node, ctx, report);
    checkDeclaredMembers(node, ctx, report);
  },
  fix: attributeFix(
    "Take the name of the standard, or of the declaration",
    "browseName",
    ({ browseName }, { data }) => {
      const namespaceUri = data?.["namespaceUri"];
      return typeof namespaceUri === "string" && namespaceUri !== browseName.namespaceUri
        ? { ...browseName, namespaceUri }
        : undefined;
    },
  ),
  examples: {
    good: {
      text: "The Property belongs to the model, its name to namespace 0.",
      build: (m) => {
        const parent = m.variable("Speed", { parent: m.object("Pump1"), type: T.DataItemType });
        m.property("0:EngineeringUnits", { parent });
        return undefined;
      },
    },
    bad: {
      text: "The Property's name is put into the model's own namespace.",
      build: (m) => {
        const parent = m.variable("Speed", { parent: m.object("Pump1"), type: T.DataItemType });
        return m.property("EngineeringUnits", { parent });
      },
    },
  },
};

/** Names that the standard gives to Properties of the node's class. */
function namesFor(node: Node, ctx: CheckContext): ReadonlySet<string> | undefined {
  switch (node.nodeClass) {
    case "Method":
      return METHOD_PROPERTIES;
    case "DataType":
      return DATA_TYPE_PROPERTIES;
    case "VariableType":
      return ANALOG_PROPERTIES;
    case "Variable":
      return findTypeDefinition(ctx, node.key) === T.PropertyType ? undefined : ANALOG_PROPERTIES;
    default:
      return undefined;
  }
}

function checkStandardProperties(node: Node, ctx: CheckContext, report: ReportFunction): void {
  const names = namesFor(node, ctx);
  if (!names) return;
  for (const { target } of ofType(ctx, ctx.childEdges(node.key), R.HasProperty)) {
    const property = ctx.node(target);
    if (!property || !names.has(property.browseName.name) || property.browseName.namespaceUri === OPC_UA_NAMESPACE)
      continue;
    report({
      key: ctx.isOwn(target) ? target : node.key,
      attribute: "browseName",
      message: `The standard Property ${property.browseName.name} of ${node.browseName.name} is named in a namespace other than 0.`,
      facts: [
        `BrowseName: ${formatQualifiedName(property.browseName)}`,
        `The standard's: ${property.browseName.name} in namespace 0`,
      ],
      data: { namespaceUri: OPC_UA_NAMESPACE },
    });
  }
}

/** A member with the right text in a wrong namespace, while the declared one is absent: a likely slip. */
function checkDeclaredMembers(node: Node, ctx: CheckContext, report: ReportFunction): void {
  const types =
    node.nodeClass === "ObjectType" || node.nodeClass === "VariableType"
      ? [node.key]
      : [findTypeDefinition(ctx, node.key)];
  const sources = types.flatMap((t) => (t === undefined ? [] : [t, ...listInterfaces(ctx, t)]));
  if (node.nodeClass === "Object") sources.push(...listInterfaces(ctx, node.key));
  const strays = listUndeclared(node, sources, ctx);
  if (strays.length === 0) return;
  const children = getChildren(ctx, node.key);
  const told = new Set<string>();
  for (const source of sources) {
    for (const { name, node: declared, owner } of getMembers(ctx, source).values()) {
      if (children.has(name)) continue;
      const child = strays.find((c) => c.browseName.name === declared.browseName.name);
      if (!child || told.has(child.key) || !ctx.isOwn(child.key) || isReportedAsStandard(node, child, ctx)) continue;
      told.add(child.key);
      report({
        key: child.key,
        severity: "warning",
        attribute: "browseName",
        message: `${child.browseName.name} has the name of a declared member but another namespace.`,
        facts: [`BrowseName: ${formatQualifiedName(child.browseName)}`, `Declared: ${name}, by ${ctx.describe(owner)}`],
        data: { namespaceUri: declared.browseName.namespaceUri },
      });
    }
  }
}

/** Children whose BrowseName no type declares; what the node itself declares first is no member of a type above it. */
function listUndeclared(node: Node, sources: readonly NodeKey[], ctx: CheckContext): NodeHead[] {
  const above = sources.filter((source) => source !== node.key).map((source) => getMembers(ctx, source));
  const undeclared: NodeHead[] = [];
  for (const [name, [child]] of getChildren(ctx, node.key)) {
    if (child && !above.some((members) => members.has(name))) undeclared.push(child);
  }
  return undeclared;
}

function isReportedAsStandard(node: Node, child: NodeHead, ctx: CheckContext): boolean {
  return (
    (namesFor(node, ctx)?.has(child.browseName.name) ?? false) &&
    child.browseName.namespaceUri !== OPC_UA_NAMESPACE &&
    isKindOf(ctx, findTypeDefinition(ctx, child.key) ?? child.key, T.PropertyType)
  );
}
