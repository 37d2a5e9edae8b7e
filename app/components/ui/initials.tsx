import { cx } from "./cx";

const tones = {
  plain: "border-ink bg-leaf text-ink",
  me: "border-ink bg-ink text-ink-on",
  mate: "border-mate bg-leaf text-mate",
} as const;

/** First letters of the first and the last word of a name. */
function toInitials(name: string): string {
  const words = name.trim().split(/\s+/u).filter(Boolean);
  const first = words[0]?.[0] ?? "?";
  const last = words.length > 1 ? (words.at(-1)?.[0] ?? "") : "";
  return (first + last).toUpperCase();
}

export function Initials({
  name,
  tone = "plain",
  small,
}: {
  name: string;
  tone?: keyof typeof tones;
  small?: boolean;
}) {
  return (
    <span
      title={name}
      aria-hidden
      className={cx(
        "inline-grid shrink-0 place-items-center border-[1.25px] leading-none font-semibold",
        small ? "size-5 text-[9.5px]" : "size-6 text-key",
        tones[tone],
      )}
    >
      {toInitials(name)}
    </span>
  );
}
