import { hasValueAttributes } from "../../address-space/node";
import { parseNodeId } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { argumentList } from "../example-values";
import { clause, type NodeRule } from "../rule";
import { walkValue } from "../value-element";
import { makeTreeQuestion } from "../value-xml";

export const r161: NodeRule = {
  id: "R161",
  title: "No aliases inside values",
  severity: "error",
  clause: clause(6, "§F.2"),
  priority: 1,
  concerns: ["Variable", "VariableType"],
  needs: ["value"],
  condition: "NodeIds inside a Value are written as NodeIds, never as an alias of the file.",
  why: "Aliases are not resolved inside values: loaders read a null NodeId or stop.",
  check(node, _ctx, report) {
    const alias = hasValueAttributes(node) ? findAlias(node.value) : undefined;
    if (alias === undefined) return;
    report({
      attribute: "value",
      message: `The Value of ${node.browseName.name} has “${alias}” in the place of a NodeId.`,
      facts: [`Identifier: ${alias}`, "Asked for: a NodeId like i=12"],
    });
  },
  examples: {
    good: {
      text: "i=11.",
      build: (m) =>
        void m.property("0:InputArguments", {
          parent: m.method("Start", { parent: m.object("Pump1") }),
          dataType: D.Argument,
          valueRank: 1,
          value: argumentList({ name: "Speed", dataType: "i=11" }),
        }),
    },
    bad: {
      text: "Double.",
      build: (m) =>
        m.property("0:InputArguments", {
          parent: m.method("Start", { parent: m.object("Pump1") }),
          dataType: D.Argument,
          valueRank: 1,
          value: argumentList({ name: "Speed", dataType: "Double" }),
        }),
    },
  },
};

const findAlias = makeTreeQuestion<string | undefined>(undefined, (root) =>
  walkValue(root)
    .filter((e) => e.name === "Identifier" && e.children.length === 0)
    .map((e) => e.text.trim())
    .find((text) => text !== "" && !isNodeId(text)),
);

/** Also true for ids of other servers and for indices that the file does not have: those are no aliases. */
function isNodeId(text: string): boolean {
  const local = text.startsWith("svr=") || text.startsWith("svu=") ? text.slice(text.indexOf(";") + 1) : text;
  const parsed = parseNodeId(local, []);
  return parsed.ok || parsed.problems.every((p) => p.code !== "node-id.syntax");
}
