import type { LocalizedText } from "../../address-space/qualified-name";
import { attributeFix } from "../fixes";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

const ATTRIBUTES = ["displayName", "description", "inverseName"] as const;
const LOCALE = /^(?:[a-z]{2,3}(?:-(?:[A-Z]{2}|[A-Z][a-z]{3}|CHS|CHT|\d{3}))*|)$/;

export const r018: NodeRule = {
  id: "R018",
  title: "Locales well formed",
  severity: "warning",
  clause: clause(3, "§8.4, §8.5.2.1"),
  priority: 2,
  concerns: ALL_CLASSES,
  condition:
    "A locale is a language of two letters, with a region where needed: en, de, en-US. “mul” and “qst” do not stand in files.",
  why: "Clients ask for “en-US” and do not get a text that is filed under “en_US”.",
  check(node, _ctx, report) {
    for (const attribute of ATTRIBUTES) {
      for (const { locale, text } of listTexts(node, attribute)) {
        if (locale === undefined || (LOCALE.test(locale) && locale !== "mul" && locale !== "qst")) continue;
        report({
          attribute,
          message: `“${locale}” of ${node.browseName.name} is no locale.`,
          facts: [`Locale: ${locale}`, `Text: “${text}”`, "Asked for: a language, then a region, for example en-US"],
          data: { locale },
        });
      }
    }
  },
  fix: {
    label: "Write the locale as language-REGION",
    apply: (space, finding, ids) => {
      const attribute = ATTRIBUTES.find((a) => a === finding.attribute) ?? "displayName";
      const mend = (texts: readonly LocalizedText[]): readonly LocalizedText[] | undefined => {
        const mended = texts.map((t) => (t.locale === undefined ? t : { ...t, locale: normalize(t.locale) }));
        return mended.every((t) => t.locale === undefined || LOCALE.test(t.locale)) ? mended : undefined;
      };
      return attributeFix("", attribute, (node) => mend(listTexts(node, attribute))).apply(space, finding, ids);
    },
  },
  examples: {
    good: {
      text: "en-US.",
      build: (m) => m.objectType("PumpType", { set: { displayName: [{ locale: "en-US", text: "Pump" }] } }),
    },
    bad: {
      text: "en_US.",
      build: (m) => m.objectType("PumpType", { set: { displayName: [{ locale: "en_US", text: "Pump" }] } }),
    },
  },
};

function listTexts(node: object, attribute: (typeof ATTRIBUTES)[number]): readonly LocalizedText[] {
  return (node as Partial<Record<typeof attribute, readonly LocalizedText[]>>)[attribute] ?? [];
}

function normalize(locale: string): string {
  const [language = "", region] = locale.trim().split(/[-_]/);
  return region === undefined ? language.toLowerCase() : `${language.toLowerCase()}-${region.toUpperCase()}`;
}
