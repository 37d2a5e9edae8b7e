import { addNamespaceMetadata } from "../../editing/commands/create-model";
import { notPossible } from "../fixes";
import { ok } from "../../core/result";
import type { ModelEntry } from "../../address-space/model-header";
import type { Node } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardObject, StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import type { ReportFunction } from "../finding";
import { findModellingRule, findStandardProperty } from "../lookups";
import { clause, type ModelRule } from "../rule";
import { findValueRoot } from "../value-xml";

const MANDATORY = [
  "NamespaceUri",
  "NamespaceVersion",
  "NamespacePublicationDate",
  "IsNamespaceSubset",
  "StaticNodeIdTypes",
  "StaticNumericNodeIdRange",
  "StaticStringNodeIdPattern",
];

export const r181: ModelRule = {
  id: "R181",
  title: "Namespace metadata object",
  severity: "error",
  clause: `${clause(6, "§F.2, §F.3")}, ${clause(5, "§6.3.13, Table 22, §6.3.14")}`,
  priority: 1,
  concerns: "model",
  condition:
    "For each model there is one Object of NamespaceMetadataType with the seven mandatory Properties whose NamespaceUri is the ModelUri. It stands below Server/Namespaces and repeats version and date of the Models table, else a warning.",
  why: "Clients read here which version of the model a server runs, and whether NodeIds are the same in every server.",
  check(ctx, report) {
    for (const model of ctx.header.models) {
      const all = listMetadata(ctx).filter((node) => readText(ctx, node.key, "NamespaceUri") === model.modelUri);
      const found = all.filter(({ key }) => findModellingRule(ctx, key) === undefined);
      if (found.length === 0) {
        report({
          attribute: "models",
          message: `The model ${model.modelUri} has no namespace metadata object.`,
          facts: [
            "Objects of NamespaceMetadataType (i=11616) with this NamespaceUri and without modelling rule: 0",
            `ModelUri: ${model.modelUri}`,
            ...all.map(
              ({ key }) => `${ctx.describe(key)} has a modelling rule, which makes it a declaration and no Object.`,
            ),
          ],
          data: { modelUri: model.modelUri },
        });
      }
      for (const node of found) checkMetadata(node, model, ctx, report);
    }
  },
  fix: {
    label: "Make the object with its Properties",
    apply(space, finding, ids) {
      if (finding.data?.["modelUri"] === undefined) return notPossible(finding);
      const made = addNamespaceMetadata(space, ids);
      return made.ok ? ok(made.value.operations) : made;
    },
  },
  examples: {
    good: { text: "The object with its seven Properties.", build: (m) => m.metadata() },
    bad: {
      text: "A model without it.",
      build: (m) => {
        m.withoutMetadata();
        m.objectType("PumpType");
        return "model";
      },
    },
  },
};

/** Own nodes of NamespaceMetadataType or a subtype. */
function listMetadata(ctx: CheckContext): Node[] {
  const types = new Set<NodeKey>([T.NamespaceMetadataType]);
  for (const type of types) for (const edge of ctx.subtypeEdges(type)) types.add(edge.target);
  const edges = [...types].flatMap((type) => ctx.otherEdgesTo(type).filter((e) => e.type === R.HasTypeDefinition));
  return edges.flatMap(({ source }) => {
    const node = ctx.node(source);
    return node && ctx.isOwn(source) ? [node] : [];
  });
}

function readText(ctx: CheckContext, key: NodeKey, property: string): string | undefined {
  const node = findStandardProperty(ctx, key, property);
  return node?.nodeClass === "Variable" ? findValueRoot(node.value)?.text.trim() : undefined;
}

function checkMetadata(node: Node, model: ModelEntry, ctx: CheckContext, report: ReportFunction): void {
  const { key } = node;
  for (const name of MANDATORY) {
    if (findStandardProperty(ctx, key, name)) continue;
    report({
      key,
      message: `The namespace metadata object has no ${name}.`,
      facts: [`Object: ${ctx.describe(key)}`, `Mandatory Properties: ${MANDATORY.join(", ")}`],
      data: { property: name },
    });
  }
  if (!ctx.parentEdges(key).some((e) => e.source === StandardObject.ServerNamespaces)) {
    report({
      key,
      severity: "warning",
      message: "The namespace metadata object does not stand below Server/Namespaces.",
      facts: [
        `Asked for: a component of Namespaces (i=11715)`,
        ...ctx.parentEdges(key).map((e) => `It stands below ${ctx.describe(e.source)}`),
      ],
    });
  }
  compareVersion(node, "NamespaceVersion", "Version", model.version, ctx, report);
  compareVersion(node, "ModelVersion", "ModelVersion", model.modelVersion, ctx, report);
  compareDate(node, model, ctx, report);
}

/** NamespaceVersion must repeat the version; ModelVersion is optional, and its absence only a hint. */
function compareVersion(
  node: Node,
  property: "NamespaceVersion" | "ModelVersion",
  attribute: string,
  expected: string | undefined,
  ctx: CheckContext,
  report: ReportFunction,
): void {
  const written = readText(ctx, node.key, property);
  const isAbsent = findStandardProperty(ctx, node.key, property) === undefined;
  if (isAbsent) {
    if (property === "ModelVersion" && expected !== undefined) {
      report({
        key: node.key,
        severity: "hint",
        message: "The namespace metadata object has no ModelVersion.",
        facts: [`ModelVersion in the Models table: ${expected}`],
      });
    }
    return;
  }
  if ((written ?? "") === (expected ?? "")) return;
  report({
    key: node.key,
    severity: "warning",
    message: `${property} is “${written ?? ""}”, but ${attribute} of the model is “${expected ?? ""}”.`,
    facts: [`${property}: ${written ?? "no value"}`, `${attribute} in the Models table: ${expected ?? "none"}`],
  });
}

const NO_DATE = "0001-01-01T00:00:00Z";

function compareDate(node: Node, model: ModelEntry, ctx: CheckContext, report: ReportFunction): void {
  if (!findStandardProperty(ctx, node.key, "NamespacePublicationDate")) return;
  const written = readText(ctx, node.key, "NamespacePublicationDate") ?? "";
  const expected = model.publicationDate ?? "";
  if (toInstant(written) === toInstant(expected)) return;
  const isSameDay = written !== "" && written.slice(0, 10) === expected.slice(0, 10);
  report({
    key: node.key,
    severity: isSameDay ? "hint" : "warning",
    message: `NamespacePublicationDate is ${written || "empty"}, but the model's PublicationDate is ${expected || "not given"}.`,
    facts: [
      `NamespacePublicationDate: ${written || "no value"}`,
      `PublicationDate in the Models table: ${expected || "none"}`,
    ],
  });
}

/** Milliseconds of a date with time zone; a null date and none are the same. */
function toInstant(text: string): number | undefined {
  if (text === "" || text === NO_DATE) return undefined;
  const zoned = /(?:Z|[+-]\d\d:\d\d)$/.test(text) ? text : `${text}Z`;
  const instant = Date.parse(zoned);
  return Number.isNaN(instant) ? undefined : instant;
}
