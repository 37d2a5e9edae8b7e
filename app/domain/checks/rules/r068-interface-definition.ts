import { isAbstract } from "../../address-space/node";
import { StandardType as T } from "../../address-space/standard-ids";
import { attributeFix } from "../fixes";
import { listSupertypes } from "../lookups";
import { isNaming, isPlaceholder, listOwnMembers } from "../members";
import { clause, type NodeRule } from "../rule";
import type { CheckContext } from "../check-context";
import type { NodeKey } from "../../address-space/node-id";
import type { ReportFunction } from "../finding";

export const r068: NodeRule = {
  id: "R068",
  title: "Definition of an Interface",
  severity: "error",
  clause: clause(3, "§4.10.2"),
  priority: 1,
  concerns: ["ObjectType"],
  condition:
    "An Interface is abstract, and its members are Mandatory or Optional. A placeholder deeper inside a member is a warning: the text sets no limit of depth.",
  why: "Who applies an Interface must know which members to make: a placeholder names none.",
  check(node, ctx, report) {
    if (!listSupertypes(ctx, node.key).includes(T.BaseInterfaceType)) return;
    if (!isAbstract(node)) {
      report({
        attribute: "isAbstract",
        message: `The Interface ${node.browseName.name} is not abstract.`,
        facts: ["IsAbstract: false", "It stands below BaseInterfaceType (i=17602)."],
      });
    }
    for (const member of listOwnMembers(ctx, node.key)) {
      if (isNaming(member.rule)) checkDeeper(member.node.key, node.browseName.name, ctx, report);
      else {
        report({
          key: ctx.isOwn(member.node.key) ? member.node.key : node.key,
          attribute: "references",
          message: `${member.node.browseName.name} of the Interface ${node.browseName.name} is ${ctx.nameOf(member.rule)}.`,
          facts: [`HasModellingRule: ${ctx.describe(member.rule)}`, "Allowed: Mandatory, Optional"],
        });
      }
    }
  },
  fix: attributeFix("Make it abstract", "isAbstract", (node, finding) =>
    finding.attribute === "isAbstract" && !isAbstract(node) ? true : undefined,
  ),
  examples: {
    good: {
      text: "An abstract Interface.",
      build: (m) => m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true }),
    },
    bad: {
      text: "One that is not abstract.",
      build: (m) => m.objectType("IRatedType", { supertype: T.BaseInterfaceType }),
    },
  },
};

function checkDeeper(start: NodeKey, interfaceName: string, ctx: CheckContext, report: ReportFunction): void {
  const seen = new Set<NodeKey>([start]);
  for (const at of seen) {
    for (const { node, rule } of listOwnMembers(ctx, at)) {
      if (seen.has(node.key)) continue;
      seen.add(node.key);
      if (!isPlaceholder(rule) || !ctx.isOwn(node.key)) continue;
      report({
        key: node.key,
        severity: "warning",
        attribute: "references",
        message: `The Interface ${interfaceName} has the placeholder ${node.browseName.name} inside a member.`,
        facts: [`HasModellingRule: ${ctx.describe(rule)}`, `Below ${ctx.describe(at)}`],
      });
    }
  }
}
