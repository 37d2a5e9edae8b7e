import { addDeclaredMembers } from "../../instantiation/instantiate";
import { findSubject, notPossible } from "../fixes";
import { ok } from "../../core/result";
import type { Node } from "../../address-space/node";
import { standardKey, type NodeKey } from "../../address-space/node-id";
import { formatQualifiedName } from "../../address-space/qualified-name";
import { StandardModellingRule as M, StandardType } from "../../address-space/standard-ids";
import { makeLookup, type CheckContext } from "../check-context";
import type { ReportFunction } from "../finding";
import { findModellingRule, findTypeDefinition, isInstanceDeclaration } from "../lookups";
import { getChildren, getMembers, isNaming, isPlaceholder, listOwnMembers, type Member } from "../members";
import { clause, type NodeRule } from "../rule";
import type { NodeHead } from "../views";

export const r086: NodeRule = {
  id: "R086",
  title: "Mandatory members present on instances",
  severity: "error",
  clause: `${clause(3, "§6.4.2, §6.4.4.4.1, §6.2.4")}, ${clause(6, "§F.3, §F.7")}`,
  priority: 1,
  concerns: ["Object", "Variable"],
  condition:
    "A plain instance has every Mandatory member of its type and supertypes, nested ones too, with the same BrowseName and NodeClass. Below placeholders and absent optional members nothing is asked for; on instance declarations a missing nested member is a hint.",
  why: "Clients written for the type read its Mandatory members without asking; here they get “node unknown”.",
  check(node, ctx, report) {
    if (node.nodeClass === "Object" && node.designToolOnly) return;
    const type = findTypeDefinition(ctx, node.key);
    // R181 asks for the members of the namespace metadata object.
    if (type === undefined || type === StandardType.NamespaceMetadataType) return;
    const isDeclaration = isInstanceDeclaration(ctx, node.key);
    if (isDeclaration && isPlaceholder(findModellingRule(ctx, node.key))) return;
    const members = ctx.lookUp(askedMembers, type);
    if (members.length === 0) return;
    checkBelow({ instance: node, type, isDeclaration, report, ctx }, node, members, []);
  },
  fix: {
    label: "Make all mandatory members that are missing",
    apply(space, finding, ids) {
      if (!findSubject(space, finding) || finding.key === undefined) return notPossible(finding);
      const made = addDeclaredMembers(space, ids, { instance: finding.key, includeMissing: true });
      if (!made.ok) return made;
      return made.value.operations.length > 0 ? ok(made.value.operations) : notPossible(finding);
    },
  },
  examples: {
    good: {
      text: "The instance has the Mandatory member of its type.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.variable("Speed", { parent: pump, rule: "Mandatory" });
        m.variable("Speed", { parent: m.object("Pump1", { type: pump }) });
        return undefined;
      },
    },
    bad: {
      text: "The instance lacks it.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.variable("Speed", { parent: pump, rule: "Mandatory" });
        return m.object("Pump1", { type: pump });
      },
    },
  },
};

type Walk = {
  readonly instance: Node;
  readonly type: NodeKey;
  readonly isDeclaration: boolean;
  readonly report: ReportFunction;
  readonly ctx: CheckContext;
};

const MAX_DEPTH = 20;

/**
 * Members of Data Access types that R119, R120, R131, R132, R133 and R135 ask for with better words: EURange and
 * EngineeringUnits of analog items, TrueState, FalseState, EnumStrings, EnumValues, ValueAsText, and those of array items.
 */
const TOLD_BY_DATA_ACCESS: ReadonlySet<NodeKey> = new Set(
  [2369, 17502, 17575, 2374, 2375, 2377, 11241, 11461, 12025, 12026, 12027, 12028].map(standardKey),
);

/** Members of a type that something is asked of: mandatory ones, and those with declarations below. */
const askedMembers = makeLookup<readonly Member[]>((ctx, type) => {
  const asked = [...getMembers(ctx, type).values()].filter((member) => isAsked(member, ctx));
  return asked.length > 0 ? asked : NO_MEMBERS;
});

const NO_MEMBERS: readonly Member[] = [];

function isAsked({ node, rule }: Member, ctx: CheckContext): boolean {
  if (!isNaming(rule) || TOLD_BY_DATA_ACCESS.has(node.key)) return false;
  return rule === M.Mandatory || listOwnMembers(ctx, node.key).length > 0;
}

/** Members of the type on `at`, and below the members found what the type declares below their declarations. */
function checkBelow(walk: Walk, at: NodeHead, members: readonly Member[], path: readonly string[]): void {
  if (path.length > MAX_DEPTH) return;
  const { ctx } = walk;
  const children = getChildren(ctx, at.key);
  for (const member of members) {
    if (!isAsked(member, ctx)) continue;
    const { name } = member;
    const child = children.get(name)?.find((c) => c.nodeClass === member.node.nodeClass);
    if (child?.key === member.node.key) continue;
    const below = child ? listOwnMembers(ctx, member.node.key) : NO_MEMBERS;
    if (child && below.length > 0) checkBelow(walk, child, below, [...path, member.node.browseName.name]);
    else if (!child && member.rule === M.Mandatory && !isToldByChild(walk, at, name, path))
      reportMissing(walk, at, member, [...path, member.node.browseName.name]);
  }
}

/** A nested node is checked against its own type by itself. */
function isToldByChild({ ctx }: Walk, at: NodeHead, name: string, path: readonly string[]): boolean {
  if (path.length === 0 || !ctx.isOwn(at.key)) return false;
  const type = findTypeDefinition(ctx, at.key);
  return type !== undefined && getMembers(ctx, type).get(name)?.rule === M.Mandatory;
}

function reportMissing(
  { instance, type, isDeclaration, report, ctx }: Walk,
  at: NodeHead,
  member: Member,
  path: readonly string[],
): void {
  const isHint = isDeclaration || isInstanceDeclaration(ctx, at.key);
  report({
    key: ctx.isOwn(at.key) ? at.key : instance.key,
    ...(isHint ? { severity: "hint" } : {}),
    message: `${at.browseName.name} has no ${member.node.browseName.name}, which ${ctx.nameOf(type)} makes Mandatory.`,
    facts: [
      `Type of ${instance.browseName.name}: ${ctx.describe(type)}`,
      `Mandatory there: ${path.join("/")}, declared by ${ctx.describe(member.node.key)}, ${member.node.nodeClass}`,
      `BrowseName looked for: ${formatQualifiedName(member.node.browseName)}`,
    ],
    data: { parent: at.key, member: member.node.key, path: path.join("/") },
  });
}
