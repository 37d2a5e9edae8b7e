/**
 * Waivers: findings that somebody accepted, with reason, name and date. A waiver holds for one rule at one node and
 * attribute while the node stays as it was: it keeps a fingerprint of the node, and when that differs the finding is open
 * again and says so.
 */
import type { AddressSpace } from "../address-space/address-space";
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import type { Finding } from "./finding";

export type Waiver = {
  readonly rule: string;
  /** NodeId text with `nsu=`; "" for the model as a whole. */
  readonly nodeId: string;
  readonly attribute?: string | undefined;
  readonly reason: string;
  readonly person: string;
  /** ISO 8601. */
  readonly date: string;
  readonly fingerprint: string;
};

export type WaivedFindings<W extends Waiver = Waiver, F extends Finding = Finding> = {
  readonly open: readonly F[];
  readonly waived: readonly { readonly finding: F; readonly waiver: W }[];
  /** Waivers of findings that are open again because their node changed. */
  readonly expired: readonly W[];
};

export function applyWaivers<W extends Waiver, F extends Finding>(
  space: AddressSpace,
  findings: readonly F[],
  waivers: readonly W[],
): WaivedFindings<W, F> {
  if (waivers.length === 0) return { open: findings, waived: [], expired: [] };
  const byPlace = new Map<string, W>();
  for (const waiver of waivers) byPlace.set(placeOf(waiver), waiver);
  const open: F[] = [];
  const waived: { finding: F; waiver: W }[] = [];
  const expired = new Set<W>();
  for (const finding of findings) {
    const waiver = byPlace.get(placeOf(finding));
    if (waiver?.fingerprint === fingerprintOf(space, finding.key)) waived.push({ finding, waiver });
    else {
      open.push(finding);
      if (waiver) expired.add(waiver);
    }
  }
  return { open, waived, expired: [...expired] };
}

/** A waiver for a finding as the model is now. */
export function makeWaiver(
  space: AddressSpace,
  { rule, nodeId, attribute, key }: Finding,
  decision: Pick<Waiver, "reason" | "person" | "date">,
): Waiver {
  return {
    rule,
    nodeId,
    ...(attribute === undefined ? {} : { attribute }),
    ...decision,
    fingerprint: fingerprintOf(space, key),
  };
}

function placeOf({ rule, nodeId, attribute = "" }: Pick<Waiver, "rule" | "nodeId" | "attribute">): string {
  return `${rule}\n${nodeId}\n${attribute}`;
}

/** Of a node all but its place in the file; of the model as a whole its table of models. */
export function fingerprintOf(space: AddressSpace, key: NodeKey | undefined): string {
  const node = key === undefined ? undefined : space.getNode(key);
  return hash(node ? toText(node) : JSON.stringify(space.own.header.models));
}

function toText(node: Node): string {
  const parts = Object.entries(node)
    .filter(([name]) => name !== "order")
    .sort(([a], [b]) => (a < b ? -1 : 1));
  return JSON.stringify(parts);
}

/** FNV-1a in two lanes, 64 bit as 16 hexadecimal digits: to notice a change, not to resist an attack. */
function hash(text: string): string {
  let [low, high] = [0x811c9dc5, 0x01000193];
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i);
    low = Math.imul(low ^ code, 0x01000193);
    high = Math.imul(high ^ (code + i), 0x85ebca6b);
  }
  return [low, high].map((n) => (n >>> 0).toString(16).padStart(8, "0")).join("");
}
