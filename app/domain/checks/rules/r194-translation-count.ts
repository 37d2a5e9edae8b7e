import { StandardDataType as D } from "../../address-space/standard-ids";
import { localizedTexts } from "../example-values";
import { clause, type NodeRule } from "../rule";
import { findValueRoot, listItemType } from "../value-xml";

export const r194: NodeRule = {
  id: "R194",
  title: "A Translation for each entry",
  severity: "error",
  clause: clause(6, "§F.8, Table F.8, §F.10"),
  priority: 2,
  concerns: ["Variable"],
  attributes: ["translations"],
  needs: ["value"],
  condition:
    "A Variable with Translations has one for each entry of its list, one for a single value; more are a hint, since readers ignore them.",
  why: "Entries without translation are shown in another language than the rest.",
  check(node, _ctx, report) {
    const count = node.nodeClass === "Variable" ? (node.translations?.length ?? 0) : 0;
    const root = node.nodeClass === "Variable" ? findValueRoot(node.value) : undefined;
    if (count === 0 || !root) return;
    const wanted = listItemType(root) === undefined ? 1 : root.children.length;
    if (count === wanted) return;
    report({
      ...(count > wanted ? { severity: "hint" } : {}),
      attribute: "translations",
      message: `${node.browseName.name} has ${count} Translations for ${wanted} entries.`,
      facts: [`Translation elements: ${count}`, `Entries of the Value: ${wanted}`],
    });
  },
  examples: {
    good: {
      text: "Two and two.",
      build: (m) =>
        m.variable("Modes", {
          parent: m.object("Pump1"),
          dataType: D.LocalizedText,
          valueRank: 1,
          value: localizedTexts("Off", "On"),
          set: { translations: [{ xml: '<Text Locale="de">Aus</Text>' }, { xml: '<Text Locale="de">Ein</Text>' }] },
        }),
    },
    bad: {
      text: "One for two.",
      build: (m) =>
        m.variable("Modes", {
          parent: m.object("Pump1"),
          dataType: D.LocalizedText,
          valueRank: 1,
          value: localizedTexts("Off", "On"),
          set: { translations: [{ xml: '<Text Locale="de">Aus</Text>' }] },
        }),
    },
  },
};
