import { findModellingRule } from "../lookups";
import { isPlaceholder } from "../members";
import { findSubject, notPossible, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import { clause, type NodeRule } from "../rule";

export const r077: NodeRule = {
  id: "R077",
  title: "Placeholders stand in angle brackets",
  severity: "warning",
  clause: clause(3, "§6.4.4.4.4, §6.4.4.4.5"),
  priority: 1,
  concerns: ["Object", "Variable"],
  needs: ["modelling rule"],
  condition:
    "BrowseName and DisplayName of a placeholder Object or Variable begin with < and end with >. Methods keep their real name.",
  why: "Readers of the type take the name for a real member and look for it on instances.",
  check(node, ctx, report) {
    const rule = findModellingRule(ctx, node.key);
    if (!isPlaceholder(rule) || rule === undefined) return;
    const names = [node.browseName.name, ...node.displayName.map((t) => t.text)];
    const bare = names.find((name) => !/^<.*>$/s.test(name));
    if (bare === undefined) return;
    report({
      attribute: "browseName",
      message: `The placeholder “${bare}” does not stand in angle brackets.`,
      facts: [
        `HasModellingRule: ${ctx.nameOf(rule)}`,
        `BrowseName: ${node.browseName.name}`,
        `DisplayName: ${node.displayName.map((t) => t.text).join(", ")}`,
      ],
    });
  },
  fix: {
    label: "Put the names in angle brackets",
    apply(space, finding) {
      const node = findSubject(space, finding);
      if (!node) return notPossible(finding);
      const wrap = (name: string): string => (/^<.*>$/s.test(name) ? name : `<${name.replace(/[<>]/g, "")}>`);
      return ok([
        setAttribute(node.key, "browseName", { ...node.browseName, name: wrap(node.browseName.name) }),
        setAttribute(
          node.key,
          "displayName",
          node.displayName.map((t) => ({ ...t, text: wrap(t.text) })),
        ),
      ]);
    },
  },
  examples: {
    good: {
      text: "<Sensor>.",
      build: (m) => m.object("<Sensor>", { parent: m.objectType("LineType"), rule: "OptionalPlaceholder" }),
    },
    bad: {
      text: "Sensor.",
      build: (m) => m.object("Sensor", { parent: m.objectType("LineType"), rule: "OptionalPlaceholder" }),
    },
  },
};
