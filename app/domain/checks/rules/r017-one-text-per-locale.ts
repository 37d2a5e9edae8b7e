import type { Node } from "../../address-space/node";
import type { LocalizedText } from "../../address-space/qualified-name";
import { attributeFix } from "../fixes";
import type { Finding } from "../finding";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

const ATTRIBUTES = ["displayName", "description"] as const;

export const r017: NodeRule = {
  id: "R017",
  title: "One DisplayName and Description per locale",
  severity: "error",
  clause: clause(6, "§F.3, Table F.2"),
  priority: 1,
  concerns: ALL_CLASSES,
  condition: "The locales of the DisplayNames of a node differ, and those of its Descriptions.",
  why: "A server can answer one text per language; which of two is taken differs from loader to loader.",
  check(node, _ctx, report) {
    for (const attribute of ATTRIBUTES) {
      if ((node[attribute]?.length ?? 0) < 2) continue;
      const locales = (node[attribute] ?? []).map((t) => t.locale ?? "");
      const twice = locales.find((locale, i) => locales.indexOf(locale) !== i);
      if (twice === undefined) continue;
      const texts = (node[attribute] ?? []).filter((t) => (t.locale ?? "") === twice);
      report({
        attribute,
        message: `${node.browseName.name} has two ${attribute === "displayName" ? "DisplayNames" : "Descriptions"} ${twice === "" ? "without locale" : `in “${twice}”`}.`,
        facts: texts.map((t) => `${twice || "no locale"}: “${t.text}”`),
      });
    }
  },
  fix: {
    label: "Keep the first text of each locale",
    apply: (space, finding, ids) => {
      const attribute = ATTRIBUTES.find((a) => a === finding.attribute) ?? "displayName";
      return attributeFix("", attribute, (node: Node, _finding: Finding) => keepFirst(node[attribute] ?? [])).apply(
        space,
        finding,
        ids,
      );
    },
  },
  examples: {
    good: {
      text: "One text in English, one in German.",
      build: (m) =>
        m.objectType("PumpType", {
          set: {
            displayName: [
              { locale: "en", text: "Pump" },
              { locale: "de", text: "Pumpe" },
            ],
          },
        }),
    },
    bad: {
      text: "Two texts in English.",
      build: (m) =>
        m.objectType("PumpType", {
          set: {
            displayName: [
              { locale: "en", text: "Pump" },
              { locale: "en", text: "Pump type" },
            ],
          },
        }),
    },
  },
};

function keepFirst(texts: readonly LocalizedText[]): LocalizedText[] {
  return texts.filter((t, i) => texts.findIndex((o) => (o.locale ?? "") === (t.locale ?? "")) === i);
}
