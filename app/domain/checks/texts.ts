/** Small helpers for the sentences of rules. */

/** C0 and C1 control characters of a text as `U+000A`, each once. */
export function listControlCharacters(text: string): string[] {
  const found = new Set<string>();
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i);
    if (code < 0x20 || (code >= 0x7f && code <= 0x9f))
      found.add(`U+${code.toString(16).toUpperCase().padStart(4, "0")}`);
  }
  return [...found];
}

/** `1 child`, `2 children`. */
export function count(n: number, one: string, many = `${one}s`): string {
  return `${n} ${n === 1 ? one : many}`;
}

/** `a`, `a or b`, `a, b or c`. */
export function either(words: readonly string[]): string {
  return words.length < 2 ? (words[0] ?? "") : `${words.slice(0, -1).join(", ")} or ${words.at(-1) ?? ""}`;
}
