/** How well an entry answers what was typed. Pure. */
import type { PaletteEntry } from "./palette-store";

/** 0 for no answer; the whole label beats its beginning, that the beginning of a word, that any place. */
export function rankText(text: string, query: string): number {
  const hay = text.toLowerCase();
  const needle = query.toLowerCase();
  if (needle === "") return 1;
  if (hay === needle) return 100;
  if (hay.startsWith(needle)) return 80;
  const at = hay.indexOf(needle);
  if (at > 0) return isWordStart(text, at) ? 60 : 40;
  return hasAllWords(hay, needle) ? 30 : hasInitials(text, needle) ? 20 : 0;
}

function isWordStart(text: string, at: number): boolean {
  const before = text[at - 1] ?? "";
  return /[^A-Za-z0-9]/.test(before) || (/[a-z0-9]/.test(before) && /[A-Z]/.test(text[at] ?? ""));
}

function hasAllWords(hay: string, needle: string): boolean {
  const words = needle.split(/\s+/).filter((word) => word !== "");
  return words.length > 1 && words.every((word) => hay.includes(word));
}

/** `ssp` finds SpindleSpeedProcess by the capitals of its words. */
function hasInitials(text: string, needle: string): boolean {
  if (needle.length < 2) return false;
  const initials = text.replace(/[^A-Z0-9]/g, "").toLowerCase();
  return initials.startsWith(needle);
}

/** The entries that answer, best first; a label counts double against its hint. */
export function rankEntries(entries: readonly PaletteEntry[], query: string, limit: number): PaletteEntry[] {
  const ranked = entries.flatMap((entry, index) => {
    const rank = Math.max(rankText(entry.label, query), rankText(`${entry.group} ${entry.label} ${entry.hint ?? ""}`, query) / 2);
    return rank === 0 ? [] : [{ entry, rank, index }];
  });
  ranked.sort((a, b) => b.rank - a.rank || a.index - b.index);
  return ranked.slice(0, limit).map(({ entry }) => entry);
}
