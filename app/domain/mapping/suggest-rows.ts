/**
 * Proposes which source feeds which Variable, with the signs that speak for each pair; a person accepts or refuses. Signs
 * are likeness of names, unit, data type, range, and what the types of DI and IO-Link mean. A unit of another quantity
 * speaks against a pair so strongly that it is not proposed.
 */
import type { AddressSpace } from "../address-space/address-space";
import type { NodeKey } from "../address-space/node-id";
import type { Direction } from "../iodd/device-description";
import { canConvert, unitByCode } from "../units/units";
import { planFrame, type FieldPlan } from "./decode-frame";
import { listTargets, type Target } from "./list-targets";
import { listParts } from "./mapping-entries";
import type { SourceReference, Transform } from "./mapping";
import { compareNames } from "./name-likeness";
import { proposeTransforms } from "./propose-transforms";
import { makeScaler } from "./scale";
import type { Tag } from "./tag";
import { makeRoleLayouts, toRowTarget } from "./type-mapping";

export type SuggestionReason = { readonly kind: "name" | "unit" | "data-type" | "range" | "semantics"; readonly text: string };

export type Suggestion = {
  readonly target: string;
  readonly path: string;
  readonly source: SourceReference;
  readonly transforms: Transform[];
  /** 0 … 1. */
  readonly score: number;
  readonly reasons: readonly SuggestionReason[];
};

export type SuggestOptions = {
  /** Tags of the source behind a role. */
  readonly tags?: readonly { readonly role: string; readonly tags: readonly Tag[] }[];
  /** Below this a pair is not worth a person's time. */
  readonly leastScore?: number;
};

const LEAST_SCORE = 0.45;
const WEIGHT = { name: 0.55, unit: 0.25, dataType: 0.1, range: 0.1 } as const;

type Candidate = {
  /** The same for two candidates that read the same. */
  readonly id: string;
  readonly source: SourceReference;
  /** Words that tell what it is, and the role behind which it stands. */
  readonly name: string;
  readonly role: string;
  readonly field?: FieldPlan;
  readonly unit?: string;
  readonly kind: "boolean" | "number" | "text" | "unknown";
  readonly scale?: number;
  readonly offset?: number;
};

/** The best pairs of free Variables and free sources, each used once, best first. */
export function suggestRows(space: AddressSpace, type: NodeKey, options: SuggestOptions = {}): Suggestion[] {
  const rows = listParts(space, "row", type);
  const taken = new Set(rows.map((row) => toRowTarget(row.id)));
  const used = new Set(rows.map((row) => JSON.stringify(row.value.source)));
  const targets = listTargets(space, type).filter((t) => !taken.has(t.target) && !t.isArray);
  const candidates = listCandidates(space, type, options).filter((c) => !used.has(JSON.stringify(c.source)));
  const pairs = targets.flatMap((target) => [
    ...candidates.flatMap((candidate) => rate(target, candidate) ?? []),
    ...suggestByMeaning(space, type, target),
  ]);
  const best = pairs.filter((p) => p.score >= (options.leastScore ?? LEAST_SCORE)).sort((a, b) => b.score - a.score || (a.path < b.path ? -1 : 1));
  const seen = new Set<string>();
  return best.filter(({ target, source }) => {
    const ids = [target, JSON.stringify(source)];
    if (ids.some((id) => seen.has(id))) return false;
    for (const id of ids) seen.add(id);
    return true;
  });
}

function listCandidates(space: AddressSpace, type: NodeKey, options: SuggestOptions): Candidate[] {
  const layouts = makeRoleLayouts(space, type);
  const fields = listParts(space, "role", type).flatMap(({ id: role }) =>
    (["in", "out"] satisfies Direction[]).flatMap((direction) => {
      const layout = layouts(role, direction);
      if (!layout.ok) return [];
      const { image, profileCharacteristic } = layout.value;
      return planFrame(image, { profileCharacteristic }).fields.map((field) => toFieldCandidate(role, direction, field));
    }),
  );
  const tags = (options.tags ?? []).flatMap((list) => list.tags.map((tag) => toTagCandidate(list.role, tag)));
  return [...fields, ...tags];
}

function toFieldCandidate(role: string, direction: Direction, field: FieldPlan): Candidate {
  const source: SourceReference = { kind: "process-data", role, direction, subindex: field.subindex };
  const unit = field.unit?.code;
  const { kind } = field.type;
  return {
    id: JSON.stringify(source),
    source,
    name: field.id.replaceAll("_", " "),
    role,
    field,
    kind: kind === "BooleanT" ? "boolean" : kind === "StringT" ? "text" : kind === "OctetStringT" ? "unknown" : "number",
    ...(unit === undefined || unit === "" ? {} : { unit }),
  };
}

function toTagCandidate(role: string, tag: Tag): Candidate {
  const source = { ...tag.reference, role } as SourceReference;
  const { unit, scale, offset } = tag;
  return {
    id: JSON.stringify(source),
    source,
    name: `${tag.name} ${tag.comment ?? ""}`,
    role,
    kind: findTagKind(tag),
    ...(unit === undefined ? {} : { unit }),
    ...(scale === undefined ? {} : { scale }),
    ...(offset === undefined ? {} : { offset }),
  };
}

function findTagKind({ reference, dataType = "" }: Tag): Candidate["kind"] {
  if (reference.kind === "register") {
    const isBit = reference.table === "coil" || reference.table === "discrete-input" || reference.bit !== undefined;
    return isBit ? "boolean" : "number";
  }
  if (/^bool/i.test(dataType)) return "boolean";
  if (/string|char|text/i.test(dataType)) return "text";
  return dataType === "" ? "unknown" : "number";
}

function rate(target: Target, candidate: Candidate): Suggestion | undefined {
  const { source } = candidate;
  const kind = findTargetKind(target);
  if (candidate.kind !== "unknown" && kind !== "unknown" && candidate.kind !== kind) return undefined;
  const reasons: SuggestionReason[] = [];
  const from = candidate.unit ?? "";
  const to = target.unit?.code ?? "";
  let score = 0;
  if (from !== "" && to !== "") {
    if (from !== to && !canConvert(from, to)) return undefined;
    score += from === to ? WEIGHT.unit : WEIGHT.unit * 0.85;
    const text = from === to ? `both in ${symbolOf(to)}` : `${symbolOf(from)} converts to ${symbolOf(to)}`;
    reasons.push({ kind: "unit", text });
  }
  const likeness = compareNames(target.path, `${candidate.role} ${candidate.name}`);
  score += WEIGHT.name * likeness.score;
  if (likeness.words.length > 0) reasons.unshift({ kind: "name", text: `both say ${likeness.words.join(", ")}` });
  if (candidate.kind === kind) {
    score += WEIGHT.dataType;
    reasons.push({ kind: "data-type", text: `${target.dataTypeName} takes it` });
  }
  const range = compareRanges(target, candidate);
  if (range > 0) {
    score += WEIGHT.range * range;
    reasons.push({ kind: "range", text: "the ranges fit" });
  }
  // Without a word in common, unit and type alone are chance.
  if (likeness.words.length === 0) return undefined;
  const { transforms } = proposeTransforms(target, candidate);
  return { target: target.target, path: target.path, source, transforms, score: Math.min(1, score), reasons };
}

function findTargetKind({ builtInType, states }: Target): Candidate["kind"] {
  if (builtInType === "Boolean") return "boolean";
  if (builtInType === "String" || builtInType === "LocalizedText") return "text";
  return /^(S?Byte|U?Int(16|32|64)|Float|Double)$/.test(builtInType) || states.length > 0 ? "number" : "unknown";
}

function symbolOf(code: string): string {
  return unitByCode(code)?.symbol ?? code;
}

/** How much of the Variable's range the source covers, 0 … 1; 0 where one of them says nothing. */
function compareRanges({ range }: Target, { field }: Candidate): number {
  const ranges = field && "ranges" in field.type ? field.type.ranges : [];
  if (!range || !field || ranges.length === 0 || range.high <= range.low) return 0;
  const scale = makeScaler(field);
  const ends = ranges.flatMap((r) => [scale(r.lower), scale(r.upper)]);
  const shared = Math.min(range.high, Math.max(...ends)) - Math.max(range.low, Math.min(...ends));
  return Math.max(0, Math.min(1, shared / (range.high - range.low)));
}

const DEVICE_HEALTH = "DeviceHealthEnumeration";
/** Standard variables of IO-Link by index, and the members of DI (OPC 10000-100 §4.5) and of names that mean the same. */
const PARAMETERS = [
  { index: 21, name: /^serial ?number$/i, text: "IO-Link parameter 21 is the serial number" },
  { index: 22, name: /^hardware ?revision$/i, text: "IO-Link parameter 22 is the hardware revision" },
  { index: 23, name: /^(software|firmware) ?revision$/i, text: "IO-Link parameter 23 is the firmware revision" },
  { index: 24, name: /tag$/i, text: "IO-Link parameter 24 is the application-specific tag" },
] as const;

/** What the standards mean: device status is DI's DeviceHealth, some parameters are its identification. */
function suggestByMeaning(space: AddressSpace, type: NodeKey, target: Target): Suggestion[] {
  const roles = listParts(space, "role", type).filter(({ value }) => value.kind === "io-link-device");
  const common = { target: target.target, path: target.path, transforms: [] };
  if (target.dataTypeName === DEVICE_HEALTH && roles.length > 0) {
    const reading = roles.filter(({ value }) => value.layouts?.in).map((r) => r.id);
    const source: SourceReference = { kind: "device-status", roles: reading.length > 0 ? reading : roles.map((r) => r.id) };
    return [{ ...common, source, score: 0.9, reasons: [{ kind: "semantics", text: "IO-Link device status is DI's DeviceHealth" }] }];
  }
  if (target.builtInType !== "String" && target.builtInType !== "LocalizedText") return [];
  const name = (target.names.at(-1)?.name ?? "").replace(/([a-z])([A-Z])/g, "$1 $2");
  const parameter = PARAMETERS.find((p) => p.name.test(name));
  return roles.flatMap(({ id: role }): Suggestion[] => {
    if (!parameter) return [];
    const likeness = compareNames(target.path, role);
    const source: SourceReference = { kind: "parameter", role, index: parameter.index, subindex: 0 };
    return [{ ...common, source, score: 0.5 + 0.3 * likeness.score, reasons: [{ kind: "semantics", text: parameter.text }] }];
  });
}
