/** What a live server has, against what was released: one list of differences that an engineer can work off. */
import { AddressSpace, buildLayer } from "../address-space/address-space";
import type { Node } from "../address-space/node";
import { formatNodeId } from "../address-space/node-id";
import type { Change, ChangeKind } from "../compare/change";
import { compareModels } from "../compare/compare-models";
import { SpaceDataTypes } from "../nodeset/values/data-type-shapes";
import type { AsBuiltAspect, AsBuiltComparison, AsBuiltDifference, AsBuiltTolerance, Observation, ServedModel } from "./as-built";
import { isSameGraph } from "./is-same-graph";
import { makeServedView, projectForServer, projectServed } from "./project-for-server";

export type AsBuiltInput = {
  /** The release with its required models. */
  readonly released: AddressSpace;
  readonly releasedModels: readonly ServedModel[];
  readonly served: { readonly nodes: readonly Node[]; readonly models: readonly ServedModel[]; readonly isComplete: boolean };
  readonly observations?: readonly Observation[];
  /** A Variable may be Bad or silent this long before it counts, ms. */
  readonly badAfter?: number;
  /** Found beside the address space. */
  readonly more?: readonly AsBuiltDifference[];
  readonly tolerance: AsBuiltTolerance;
};

const DEFAULT_BAD_AFTER = 5_000;
/** A value that comes in twice the promised time is late, not wrong (common practice, no source). */
const RATE_ALLOWANCE = 2;
/** Changes that must have been seen before anything is said of the rate. */
const SAMPLES_FOR_RATE = 6;

export function compareAsBuilt(input: AsBuiltInput): AsBuiltComparison {
  const found = [...compareServedModels(input), ...compareServedNodes(input), ...judgeObservations(input), ...(input.more ?? [])];
  const differences = found.map((difference) => withTolerance(difference, input.tolerance));
  const counted = differences.filter((d) => d.ignoredBy === undefined).length;
  return {
    verdict: counted > 0 ? "differs" : input.served.isComplete ? "as released" : "not shown",
    differences,
    counts: { nodes: input.released.own.nodes.size, counted, ignored: differences.length - counted },
  };
}

function compareServedModels({ releasedModels, served }: AsBuiltInput): AsBuiltDifference[] {
  return releasedModels.flatMap((released): AsBuiltDifference[] => {
    const model = served.models.find((m) => m.modelUri === released.modelUri);
    const path = released.modelUri;
    if (!model) return [{ aspect: "namespace", kind: "namespace-missing", path, released: path, found: null }];
    const [before, after] = [describeVersion(released), describeVersion(model)];
    // A server that says nothing of a version is not contradicted by the release.
    const isTold = model.version !== undefined || model.publicationDate !== undefined;
    const isSame = sameWhereTold(released.version, model.version) && sameWhereTold(released.publicationDate?.slice(0, 10), model.publicationDate?.slice(0, 10));
    return isSame || !isTold ? [] : [{ aspect: "version", kind: "version-differs", path, released: before, found: after }];
  });
}

function sameWhereTold(a: string | undefined, b: string | undefined): boolean {
  return a === undefined || b === undefined || a === b;
}

function describeVersion(model: ServedModel): string {
  return [model.version ?? "", model.publicationDate?.slice(0, 10) ?? ""].filter(Boolean).join(" of ") || "no version";
}

function compareServedNodes({ released, served, tolerance }: AsBuiltInput): AsBuiltDifference[] {
  const nodes = released.listOwnNodes();
  const namespaces = new Set(nodes.map((n) => n.nodeId.namespaceUri));
  const liveNodes = served.nodes.filter((n) => namespaces.has(n.nodeId.namespaceUri));
  const types = new SpaceDataTypes(released);
  const liveById = new Map(liveNodes.map((n) => [formatNodeId(n.nodeId), n]));
  const releasedById = new Map(nodes.map((n) => [formatNodeId(n.nodeId), n]));
  const releasedView = makeServedView(released, types, nodes);
  const liveView = makeServedView(released, types, liveNodes);
  const expected = nodes.map((node) => projectForServer(releasedView, node, liveById.get(formatNodeId(node.nodeId))));
  const shown = liveNodes.map((node) => projectServed(liveView, node, releasedById.get(formatNodeId(node.nodeId))));
  if (isSameGraph(expected, shown)) return [];
  const required = released.layers.slice(0, -1);
  const toSpace = (list: readonly Node[]): AddressSpace => AddressSpace.of(required, buildLayer(released.own.header, list));
  return compareModels(toSpace(expected), toSpace(shown))
    .changes.filter((change) => counts(change, tolerance))
    .map(toDifference);
}

const TEXT_KINDS: ReadonlySet<ChangeKind> = new Set(["text-changed"]);

function counts(change: Change, tolerance: AsBuiltTolerance): boolean {
  if (TEXT_KINDS.has(change.kind)) return tolerance.areTextsChecked;
  return change.kind !== "range-changed" || !isWithin(change, tolerance.range);
}

/** Whether two written ranges differ by no more than the share of the released span. */
function isWithin({ before, after }: Change, share: number): boolean {
  const [a, b] = [readNumbers(before), readNumbers(after)];
  if (a.length !== 2 || b.length !== 2 || share <= 0) return false;
  const [low = 0, high = 0] = a;
  const allowed = Math.abs(high - low) * share;
  return a.every((limit, i) => Math.abs(limit - (b[i] ?? Infinity)) <= allowed);
}

function readNumbers(text: string | null): number[] {
  return (text?.replaceAll("−", "-").match(/-?\d+(?:\.\d+)?(?:e[+-]?\d+)?/gi) ?? []).map(Number);
}

const ASPECTS: Readonly<Partial<Record<ChangeKind, AsBuiltAspect>>> = {
  "member-added": "additional",
  "type-added": "additional",
  "instance-added": "additional",
  "member-removed": "missing",
  "type-removed": "missing",
  "instance-removed": "missing",
  "id-reused": "identity",
  renumbered: "identity",
  renamed: "identity",
  moved: "identity",
  "node-class-changed": "type",
  "supertype-changed": "type",
  "type-definition-changed": "type",
  "modelling-rule-changed": "type",
  "abstract-changed": "type",
  "symmetric-changed": "type",
  "data-type-changed": "data type",
  "value-rank-changed": "data type",
  "enumeration-changed": "data type",
  "structure-changed": "data type",
  "arguments-changed": "data type",
  "unit-changed": "unit",
  "range-changed": "range",
  "access-changed": "access",
  "permissions-changed": "access",
  "value-changed": "value",
  "text-changed": "text",
};

function toDifference(change: Change): AsBuiltDifference {
  return {
    aspect: ASPECTS[change.kind] ?? "reference",
    kind: change.kind,
    ...(change.nodeId === undefined ? {} : { nodeId: change.nodeId }),
    path: change.path,
    ...(change.detail === undefined ? {} : { detail: change.detail }),
    released: change.before,
    found: change.after,
  };
}

function judgeObservations({ observations = [], badAfter = DEFAULT_BAD_AFTER }: AsBuiltInput): AsBuiltDifference[] {
  return observations.flatMap((seen): AsBuiltDifference[] => {
    const { nodeId, path } = seen;
    if (seen.samples === 0) return [{ aspect: "status", kind: "never-came", nodeId, path, released: "a value", found: null }];
    if (seen.badFor >= badAfter) {
      const found = `${seen.worstStatus} for ${formatSeconds(seen.badFor)}`;
      return [{ aspect: "status", kind: "bad-status", nodeId, path, released: "Good", found }];
    }
    const { promisedPeriod } = seen;
    // A value that stood still, or came once in time, contradicts nothing.
    if (promisedPeriod === undefined || seen.samples < SAMPLES_FOR_RATE) return [];
    if ((seen.shortestGap ?? 0) <= promisedPeriod * RATE_ALLOWANCE) return [];
    const found = `every ${formatSeconds(seen.watchedFor / seen.samples)}`;
    return [{ aspect: "rate", kind: "too-slow", nodeId, path, released: `every ${formatSeconds(promisedPeriod)}`, found }];
  });
}

function formatSeconds(milliseconds: number): string {
  return `${Number((milliseconds / 1000).toPrecision(3))} s`;
}

function withTolerance(difference: AsBuiltDifference, tolerance: AsBuiltTolerance): AsBuiltDifference {
  const pattern = tolerance.ignored.find((p) => matches(p, difference.path) || (difference.nodeId !== undefined && matches(p, difference.nodeId)));
  return pattern === undefined ? difference : { ...difference, ignoredBy: pattern };
}

/** `*` stands for any characters; everything else for itself. Linear, whatever the pattern. */
export function matches(pattern: string, text: string): boolean {
  const parts = pattern.split("*");
  if (parts.length === 1) return pattern === text;
  const [first = "", last = ""] = [parts[0], parts.at(-1)];
  if (!text.startsWith(first) || text.length < first.length + last.length || !text.endsWith(last)) return false;
  let at = first.length;
  for (const part of parts.slice(1, -1)) {
    const found = text.indexOf(part, at);
    if (found < 0) return false;
    at = found + part.length;
  }
  return at <= text.length - last.length;
}
