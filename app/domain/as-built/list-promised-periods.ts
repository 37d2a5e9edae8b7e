/** How often the mapping promises a new value, where somebody who watches could tell. */
import type { AddressSpace } from "../address-space/address-space";
import { makeFeed } from "../mapping/make-feed";
import type { PlannedSource } from "../mapping/make-wiring";
import { DEFAULT_PERIOD } from "../mapping/plan-readings";

/**
 * Periods in ms by NodeId text (`nsu=`). Only of measured numbers: a state that stays is told once, whatever the period
 * (OPC 10000-4 §7.11.3: the source timestamp tells the last change), and nothing follows from its silence.
 */
export function listPromisedPeriods(space: AddressSpace, sources: readonly PlannedSource[]): Map<string, number> {
  const periods = new Map<string, number>();
  for (const { mapping, nodes, unbound } of makeFeed(space, sources).machines) {
    for (const { target, direction, source, period = DEFAULT_PERIOD } of mapping.rows) {
      const node = nodes.find((n) => n.target === target);
      if (direction === "out" || source.kind === "constant" || !node) continue;
      if (node.builtInType !== "Double" && node.builtInType !== "Float") continue;
      if ("role" in source && unbound.includes(source.role)) continue;
      periods.set(node.nodeId, period);
    }
  }
  return periods;
}
