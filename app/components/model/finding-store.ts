/** The checker's latest answer, by node, so that badges are drawn anew only where they changed. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findParent } from "~/domain/address-space/browse";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Severity } from "~/domain/core/result";
import type { Finding } from "~/domain/checks/finding";
import { applyWaivers } from "~/domain/checks/waivers";
import type { ShownWaiver } from "~/presenters/waivers.server";
import { isProperty } from "./member-facts";

/** One badge a row: the worst severity wins, the count tells of more. */
export type Badge = { readonly severity: Severity; readonly count: number; readonly title: string };

export type FindingTally = Readonly<Record<Severity, number>>;

export type WaivedFinding = { readonly finding: Finding; readonly waiver: ShownWaiver };

type FindingState = {
  /** Those that nobody has accepted. */
  readonly findings: readonly Finding[];
  readonly waived: readonly WaivedFinding[];
  readonly byNode: ReadonlyMap<NodeKey, readonly Finding[]>;
  readonly tally: FindingTally;
  /** False until the checker has answered once. */
  readonly isKnown: boolean;
  /** How far a check of the whole model is, 0 to 1, while one runs. */
  readonly progress?: number;
};

const NOTHING: FindingState = {
  findings: [],
  waived: [],
  byNode: new Map(),
  tally: { error: 0, warning: 0, hint: 0 },
  isKnown: false,
};
const WEIGHT: Readonly<Record<Severity, number>> = { error: 0, warning: 1, hint: 2 };

export class FindingStore {
  #state = NOTHING;
  #checked: { readonly space: AddressSpace; readonly findings: readonly Finding[] } | undefined;
  #waivers: readonly ShownWaiver[] = [];
  readonly #listeners = new Set<() => void>();

  readonly getState = (): FindingState => this.#state;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  set(space: AddressSpace, findings: readonly Finding[]): void {
    this.#checked = { space, findings };
    this.#show();
  }

  /** Told while the whole model is checked in steps; the next `set` ends it. */
  setProgress(progress: number): void {
    if (progress - (this.#state.progress ?? 0) < 0.05) return;
    this.#state = { ...this.#state, progress };
    for (const listener of [...this.#listeners]) listener();
  }

  /** What the team has accepted; each holds while its node stays as it was. */
  setWaivers(waivers: readonly ShownWaiver[]): void {
    this.#waivers = waivers;
    this.#show();
  }

  /** A finding at a Property is shown at its owner too, since rows do not list Properties of Variables. */
  #show(): void {
    if (!this.#checked) return;
    const { space } = this.#checked;
    const { open: findings, waived } = applyWaivers(space, this.#checked.findings, this.#waivers);
    const byNode = new Map<NodeKey, Finding[]>();
    const tally = { error: 0, warning: 0, hint: 0 };
    for (const finding of findings) {
      tally[finding.severity]++;
      if (finding.key === undefined) continue;
      push(byNode, finding.key, finding);
      const node = space.getNode(finding.key);
      const owner = node && isProperty(space, node) ? findParent(space, node.key) : undefined;
      if (owner !== undefined) push(byNode, owner, finding);
    }
    for (const list of byNode.values()) list.sort((a, b) => WEIGHT[a.severity] - WEIGHT[b.severity]);
    this.#state = { findings, waived, byNode, tally, isKnown: true };
    for (const listener of [...this.#listeners]) listener();
  }
}

function push(map: Map<NodeKey, Finding[]>, key: NodeKey, finding: Finding): void {
  const list = map.get(key);
  if (list) list.push(finding);
  else map.set(key, [finding]);
}

export function toBadge(findings: readonly Finding[] | undefined): Badge | undefined {
  const worst = findings?.[0];
  if (!worst || !findings) return undefined;
  const more = findings.length > 1 ? ` (and ${findings.length - 1} more)` : "";
  return { severity: worst.severity, count: findings.length, title: `${worst.message}${more}` };
}
