import type { ReviewChange } from "~/services/read-review.server";
import { effectWords } from "./review-words";

type Effect = ReviewChange["readers"][number]["effect"];

const shapes: Record<Effect, string> = {
  stops: "M1 8h5.5M9.5 8H15M5 12.5l2-9M9 12.5l2-9",
  look: "M8 4.5a3.5 3.5 0 1 0 0 7 3.5 3.5 0 0 0 0-7z",
  "may-use": "M8 2.5v11M2.5 8h11",
};
const colours: Record<Effect, string> = { stops: "text-removed", look: "text-ink-2", "may-use": "text-added" };

/** What a change does to a reader: broken line, ring, plus. An empty label where the words stand beside it. */
export function EffectMark({ effect, label }: { effect: Effect; label?: string }) {
  return (
    <svg
      viewBox="0 0 16 16"
      width={15}
      height={15}
      {...(label === "" ? { "aria-hidden": true } : { role: "img", "aria-label": label ?? effectWords[effect] })}
      className={`inline-block ${colours[effect]}`}
      fill="none"
      stroke="currentColor"
      strokeWidth={1.6}
    >
      <path d={shapes[effect]} />
    </svg>
  );
}
