/**
 * Rules that a team sets itself: how nodes are named, in which language they are described, that units stand in the
 * description. They have the numbers R301 to R303 and run only where the conventions ask for them.
 */
import type { Node, NodeClass } from "../address-space/node";
import { isTypeNode } from "../address-space/node";
import { z } from "zod";
import { StandardDataType, StandardType } from "../address-space/standard-ids";
import type { CheckContext } from "./check-context";
import { CELSIUS } from "./example-values";
import { findStandardProperty, isInstanceDeclaration, isProperty } from "./lookups";
import { ALL_CLASSES } from "./node-classes";
import { type NodeRule } from "./rule";
import { listUnits } from "./unit-values";

const pattern = z.string().refine(isPattern, { message: "is no pattern" });

export const conventionsSchema = z.object({
  /** Pattern that the whole name must match, by NodeClass: `{"Variable": "[A-Z][A-Za-z0-9]*"}`. */
  names: z
    .partialRecord(
      z.enum(["Object", "Variable", "Method", "View", "ObjectType", "VariableType", "DataType", "ReferenceType"]),
      pattern,
    )
    .optional(),
  /** A locale in which every DisplayName must stand: `de`. */
  language: z.string().optional(),
  /** Descriptions of Variables with a unit name its symbol. */
  unitInDescription: z.boolean().optional(),
});

export type Conventions = z.infer<typeof conventionsSchema>;

const CLAUSE = "convention of the team";
const WHY = "The team has agreed on it, and other tools and people rely on it.";

/** The rules for the conventions that are set; none for an empty set. */
export function makeConventionRules({ names, language, unitInDescription }: Conventions): NodeRule[] {
  return [
    ...(names ? [makeNameRule(names)] : []),
    ...(language === undefined ? [] : [makeLanguageRule(language)]),
    ...(unitInDescription ? [makeUnitRule()] : []),
  ];
}

function isPattern(text: string): boolean {
  // A pattern with repetitions inside repetitions could take for ever on a long name.
  if (text.length > 200 || /[*+}]\)*[*+{]/.test(text)) return false;
  try {
    return new RegExp(`^(?:${text})$`, "u").source !== "";
  } catch {
    return false;
  }
}

function makeNameRule(names: Partial<Record<NodeClass, string>>): NodeRule {
  const patterns = new Map(
    Object.entries(names).map(([nodeClass, text]) => [nodeClass, new RegExp(`^(?:${text})$`, "u")] as const),
  );
  return {
    id: "R301",
    title: "Names follow the team's pattern",
    severity: "warning",
    clause: CLAUSE,
    priority: 2,
    concerns: ALL_CLASSES,
    condition: "The BrowseName of each node that the model names itself matches the pattern of its NodeClass.",
    why: WHY,
    check(node, ctx, report) {
      const wanted = patterns.get(node.nodeClass);
      const { name } = node.browseName;
      if (!wanted || !isNamedHere(node, ctx) || name.length > 512 || wanted.test(name)) return;
      report({
        attribute: "browseName",
        message: `“${name}” does not match the team's pattern for ${node.nodeClass}s.`,
        facts: [`Pattern: ${names[node.nodeClass] ?? ""}`, `BrowseName: ${name}`],
      });
    },
    examples: {
      good: { text: "A name that matches.", build: (m) => m.objectType("PumpType") },
      bad: { text: "A name that does not.", build: (m) => m.objectType("pump") },
    },
  };
}

function makeLanguageRule(language: string): NodeRule {
  return {
    id: "R302",
    title: "DisplayNames in the team's language",
    severity: "warning",
    clause: CLAUSE,
    priority: 2,
    concerns: ALL_CLASSES,
    condition: "Each node that the model names itself has a DisplayName in the language that the team agreed on.",
    why: WHY,
    check(node, ctx, report) {
      if (
        !isNamedHere(node, ctx) ||
        node.displayName.some((t) => t.locale === language || t.locale?.startsWith(`${language}-`))
      )
        return;
      report({
        attribute: "displayName",
        message: `${node.browseName.name} has no DisplayName in “${language}”.`,
        facts: [`Locales: ${node.displayName.map((t) => t.locale || "none").join(", ") || "none"}`],
      });
    },
    examples: {
      good: {
        text: "A text in the language.",
        build: (m) => m.objectType("PumpType", { set: { displayName: [{ locale: language, text: "Pump" }] } }),
      },
      bad: { text: "No text in the language.", build: (m) => m.objectType("PumpType") },
    },
  };
}

function makeUnitRule(): NodeRule {
  return {
    id: "R303",
    title: "The unit stands in the description",
    severity: "hint",
    clause: CLAUSE,
    priority: 2,
    concerns: ["Variable"],
    condition: "The Description of a Variable with a unit names the unit's symbol.",
    why: WHY,
    check(node, ctx, report) {
      const property = findStandardProperty(ctx, node.key, "EngineeringUnits");
      const [unit] = property?.nodeClass === "Variable" ? listUnits(property.value) : [];
      const texts = (node.description ?? []).map((t) => t.text);
      if (!unit?.symbol || texts.some((text) => text.includes(unit.symbol))) return;
      report({
        attribute: "description",
        message: `The Description of ${node.browseName.name} does not name its unit ${unit.symbol}.`,
        facts: [`Unit: ${unit.symbol}`, `Description: ${texts[0] ?? "none"}`],
      });
    },
    examples: {
      good: { text: "No unit, nothing to name.", build: (m) => m.variable("Label", { parent: m.object("Pump1") }) },
      bad: {
        text: "A unit that is not named.",
        build: (m) => {
          const variable = m.variable("OilTemperature", {
            parent: m.object("Press1"),
            type: StandardType.AnalogUnitType,
          });
          m.property("0:EngineeringUnits", {
            parent: variable,
            dataType: StandardDataType.EUInformation,
            value: CELSIUS,
          });
          return variable;
        },
      },
    },
  };
}

/** Properties and members whose name another model gave are not the team's to name. */
function isNamedHere(node: Node, ctx: CheckContext): boolean {
  if (node.browseName.namespaceUri !== node.nodeId.namespaceUri) return false;
  return isTypeNode(node) || isInstanceDeclaration(ctx, node.key) || !isProperty(ctx, node.key);
}
