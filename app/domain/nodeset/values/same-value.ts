/** Whether two Variants are the same value, item by item: NaN is itself, −0 is not 0, an absent part is no null. */
export function isSameValue(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true;
  if (typeof a !== "object" || typeof b !== "object" || a === null || b === null) return false;
  if (Array.isArray(a) !== Array.isArray(b)) return false;
  const names = Object.keys(a);
  if (names.length !== Object.keys(b).length) return false;
  const [left, right] = [a, b] as Readonly<Record<string, unknown>>[];
  return names.every((name) => right !== undefined && name in right && isSameValue(left?.[name], right[name]));
}
