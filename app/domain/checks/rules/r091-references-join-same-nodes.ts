import type { NodeKey } from "../../address-space/node-id";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { addReference, findSubject, keyOf, notPossible } from "../fixes";
import { ok } from "../../core/result";
import { makeLookup } from "../check-context";
import { findTypeDefinition } from "../lookups";
import { getChildren, getMembers, isNaming, type Member } from "../members";
import { clause, type NodeRule } from "../rule";

/** Members that their owner names over two references or more. */
const joinedMembers = makeLookup<readonly { readonly member: Member; readonly links: readonly NodeKey[] }[]>(
  (ctx, type) =>
    [...getMembers(ctx, type).values()].flatMap((member) => {
      if (!isNaming(member.rule)) return [];
      const links = ctx
        .childEdges(member.owner)
        .filter((e) => e.target === member.node.key)
        .map((e) => e.type);
      return links.length < 2 ? [] : [{ member, links }];
    }),
);

export const r091: NodeRule = {
  id: "R091",
  title: "Several references between two declarations keep joining the same nodes",
  severity: "error",
  clause: clause(3, "§6.4.3"),
  priority: 2,
  concerns: ["Object", "Variable"],
  needs: ["children", "no type above"],
  condition: "Where the type has several references to one member, the instance has all of them to its one member.",
  why: "Events, for example, are then announced for another node than the one that sends them.",
  check(node, ctx, report) {
    const type = findTypeDefinition(ctx, node.key);
    if (type === undefined) return;
    for (const { member, links } of ctx.lookUp(joinedMembers, type)) {
      const child = getChildren(ctx, node.key).get(member.name)?.[0];
      if (!child) continue;
      const found = ctx
        .childEdges(node.key)
        .filter((e) => e.target === child.key)
        .map((e) => e.type);
      const missing = links.find((link) => !found.some((f) => ctx.closure(link).has(f)));
      if (missing === undefined) continue;
      report({
        attribute: "references",
        message: `${node.browseName.name} has no ${ctx.nameOf(missing)} to ${child.browseName.name}, as its type has.`,
        facts: [
          `The type: ${links.map((l) => ctx.nameOf(l)).join(", ")} to ${ctx.describe(member.node.key)}`,
          `Here: ${found.map((l) => ctx.nameOf(l)).join(", ")} to ${ctx.describe(child.key)}`,
        ],
        data: { type: missing, target: child.key },
      });
    }
  },
  fix: {
    label: "Add the missing reference",
    apply(space, finding) {
      const node = findSubject(space, finding);
      const [type, target] = [keyOf(finding, "type"), keyOf(finding, "target")];
      if (!node || type === undefined || target === undefined) return notPossible(finding);
      return ok([addReference(space, node.key, type, target)]);
    },
  },
  examples: {
    good: {
      text: "Both references to one node.",
      build: (m) => {
        const plant = m.objectType("PlantType", {});
        const area = m.object("Area", { parent: plant, rule: "Mandatory", set: { eventNotifier: 1 } });
        m.reference(plant, R.HasNotifier, area);
        const plant1 = m.object("Plant1", { type: plant, set: { eventNotifier: 1 } });
        m.reference(plant1, R.HasNotifier, m.object("Area", { parent: plant1, set: { eventNotifier: 1 } }));
        return undefined;
      },
    },
    bad: {
      text: "One of the two is missing.",
      build: (m) => {
        const plant = m.objectType("PlantType", {});
        const area = m.object("Area", { parent: plant, rule: "Mandatory", set: { eventNotifier: 1 } });
        m.reference(plant, R.HasNotifier, area);
        const plant1 = m.object("Plant1", { type: plant, set: { eventNotifier: 1 } });
        m.object("Area", { parent: plant1, set: { eventNotifier: 1 } });
        return plant1;
      },
    },
  },
};
