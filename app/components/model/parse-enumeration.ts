/** Values of an enumeration, one a line: `Off`, `2 Running`, `11 = Yarn break`. Pure. */
export type EnumerationLine = { readonly value: number; readonly name: string };

/** Lines without a number take the next one; empty lines are left out. */
export function parseEnumeration(text: string): EnumerationLine[] {
  const found: EnumerationLine[] = [];
  let next = 0;
  for (const line of text.split(/\r?\n/)) {
    const match = /^\s*(?:(-?\d+)\s*[=:;,.)\t ]\s*)?(.*?)\s*$/.exec(line);
    const name = match?.[2] ?? "";
    if (name === "") continue;
    const value = match?.[1] === undefined ? next : Number(match[1]);
    next = value + 1;
    found.push({ value, name });
  }
  return found;
}
