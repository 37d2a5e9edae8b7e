import { listUses } from "../../address-space/address-space";
import { findProperty } from "../../address-space/browse";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { findSubject, notPossible } from "../fixes";
import { ok } from "../../core/result";
import { findStandardProperty } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { argumentList } from "../example-values";
import { findValueRoot } from "../value-xml";

export const r163: NodeRule = {
  id: "R163",
  title: "No Property for an empty argument list",
  severity: "hint",
  clause: clause(3, "§5.7.1"),
  priority: 2,
  concerns: ["Method"],
  needs: ["children"],
  condition: "A Method without inputs or outputs has no Property for them; an empty list means the same.",
  why: "Some clients show an empty form instead of calling at once.",
  check(node, ctx, report) {
    for (const name of ["InputArguments", "OutputArguments"]) {
      const property = findStandardProperty(ctx, node.key, name);
      if (property?.nodeClass !== "Variable" || !property.value) continue;
      const root = findValueRoot(property.value);
      if (!root || root.children.length > 0 || root.name !== "ListOfExtensionObject") continue;
      report({
        message: `${name} of ${node.browseName.name} is an empty list.`,
        facts: [`Property: ${ctx.describe(property.key)}`, "Arguments: 0"],
        data: { property: name },
      });
    }
  },
  fix: {
    label: "Remove the Property",
    apply(space, finding) {
      const node = findSubject(space, finding);
      const name = finding.data?.["property"];
      const property = node && typeof name === "string" ? findProperty(space, node.key, name) : undefined;
      if (!property || !space.isOwn(property.key) || listUses(space.own, property).length > 0)
        return notPossible(finding);
      return ok([{ kind: "removeNode", key: property.key }]);
    },
  },
  examples: {
    good: { text: "No Property.", build: (m) => m.method("Start", { parent: m.object("Pump1") }) },
    bad: {
      text: "An empty list.",
      build: (m) => {
        const start = m.method("Start", { parent: m.object("Pump1") });
        m.property("0:InputArguments", { parent: start, dataType: D.Argument, valueRank: 1, value: argumentList() });
        return start;
      },
    },
  },
};
