import { FindingTallyBadge } from "../notation/finding-badge";
import { useFindingTally } from "./use-model";

/** Errors and warnings as the checker sees the model now, for the tab. */
export function FindingCounts() {
  const tally = useFindingTally();
  return tally ? <FindingTallyBadge tally={tally} /> : null;
}
