import type { Node } from "../../address-space/node";
import { formatQualifiedName } from "../../address-space/qualified-name";
import {
  StandardModellingRule as M,
  StandardReferenceType as R,
  StandardType as T,
} from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import type { ReportFunction } from "../finding";
import { findModellingRule, findTypeDefinition, ofType } from "../lookups";
import { getChildren, getMembers, isPlaceholder, listOwnMembers, type Member } from "../members";
import { clause, type NodeRule } from "../rule";
import type { NodeHead } from "../views";

export const r069: NodeRule = {
  id: "R069",
  title: "Mandatory members of an Interface present",
  severity: "error",
  clause: clause(3, "§4.10.2, §6.2.4, §6.4.4.4.4, §6.4.4.4.5"),
  priority: 1,
  concerns: ["Object", "ObjectType"],
  condition:
    "An ObjectType has every Mandatory member of the Interfaces that it applies, as Mandatory; an Object has every one of them. Below absent optional members and on placeholders nothing is asked for.",
  why: "An Interface is a promise: clients that find HasInterface read its members without asking whether they are there.",
  check(node, ctx, report) {
    if (isPlaceholder(findModellingRule(ctx, node.key))) return;
    for (const { target } of ofType(ctx, ctx.otherEdges(node.key), R.HasInterface)) {
      const members = [...getMembers(ctx, target).values()];
      checkMembers(
        { owner: node, applied: target, isType: node.nodeClass === "ObjectType", path: [] },
        node,
        members,
        ctx,
        report,
      );
    }
  },
  examples: {
    good: {
      text: "The type has the Interface's member as Mandatory.",
      build: (m) => {
        const face = m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true });
        m.variable("RatedSpeed", { parent: face, rule: "Mandatory" });
        const pump = m.objectType("PumpType");
        m.reference(pump, R.HasInterface, face);
        m.variable("RatedSpeed", { parent: pump, rule: "Mandatory" });
        return undefined;
      },
    },
    bad: {
      text: "The type applies the Interface and has no such member.",
      build: (m) => {
        const face = m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true });
        m.variable("RatedSpeed", { parent: face, rule: "Mandatory" });
        const pump = m.objectType("PumpType");
        m.reference(pump, R.HasInterface, face);
        return pump;
      },
    },
  },
};

type Walk = {
  readonly owner: Node;
  readonly applied: Node["key"];
  readonly isType: boolean;
  readonly path: readonly string[];
};

function checkMembers(
  walk: Walk,
  at: NodeHead,
  members: readonly Member[],
  ctx: CheckContext,
  report: ReportFunction,
): void {
  if (walk.path.length > MAX_DEPTH) return;
  for (const member of members) {
    const name = formatQualifiedName(member.node.browseName);
    const found = findSimilar(walk, at, name, member, ctx);
    const path = [...walk.path, member.node.browseName.name];
    if (member.rule === M.Mandatory && !isGivenByType(walk, at, name, ctx)) {
      if (!found) reportMissing(walk, path, member, ctx, report);
      else if (walk.isType && findModellingRule(ctx, found.key) !== M.Mandatory)
        reportRule(walk, path, member, found, ctx, report);
    }
    if (found && !isPlaceholder(member.rule))
      checkMembers({ ...walk, path }, found, listOwnMembers(ctx, member.node.key), ctx, report);
  }
}

const MAX_DEPTH = 20;

function findSimilar(walk: Walk, at: NodeHead, name: string, member: Member, ctx: CheckContext): NodeHead | undefined {
  const inherited = at.nodeClass === "ObjectType" ? getMembers(ctx, at.key).get(name)?.node : undefined;
  if (inherited?.nodeClass === member.node.nodeClass) return inherited;
  return getChildren(ctx, at.key)
    .get(name)
    ?.find((child) => child.nodeClass === member.node.nodeClass);
}

/** A nested member that the type of its parent already makes Mandatory comes with every instance. */
function isGivenByType(walk: Walk, at: NodeHead, name: string, ctx: CheckContext): boolean {
  if (walk.path.length === 0) return false;
  const type = findTypeDefinition(ctx, at.key);
  return type !== undefined && getMembers(ctx, type).get(name)?.rule === M.Mandatory;
}

function reportMissing(
  walk: Walk,
  path: readonly string[],
  member: Member,
  ctx: CheckContext,
  report: ReportFunction,
): void {
  report({
    message: `${walk.owner.browseName.name} has no ${path.join("/")}, which the Interface ${ctx.nameOf(walk.applied)} makes Mandatory.`,
    facts: [
      `HasInterface: ${ctx.describe(walk.applied)}`,
      `Mandatory there: ${ctx.describe(member.node.key)}, BrowseName ${formatQualifiedName(member.node.browseName)}`,
    ],
    data: { interface: walk.applied, member: member.node.key, path: path.join("/") },
  });
}

function reportRule(
  walk: Walk,
  path: readonly string[],
  member: Member,
  found: NodeHead,
  ctx: CheckContext,
  report: ReportFunction,
): void {
  const rule = findModellingRule(ctx, found.key);
  report({
    message: `${path.join("/")} of ${walk.owner.browseName.name} is not Mandatory, as the Interface ${ctx.nameOf(walk.applied)} asks.`,
    facts: [
      `Mandatory in ${ctx.describe(walk.applied)}: ${ctx.describe(member.node.key)}`,
      `Here: ${ctx.describe(found.key)} with the rule ${rule === undefined ? "none" : ctx.nameOf(rule)}`,
    ],
    data: { interface: walk.applied, found: found.key, path: path.join("/") },
  });
}
