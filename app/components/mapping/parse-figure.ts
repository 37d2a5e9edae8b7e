/** A figure as people write it: `−0,5`, `1 000`, `0x1F`; undefined for anything that is no finite number. */
export function parseFigure(text: string): number | undefined {
  const plain = text
    .trim()
    .replace(/−/g, "-")
    .replace(/[\s\u2009\u202f]/g, "")
    .replace(",", ".");
  if (plain === "" || !/^[-+]?(?:0x[0-9a-f]+|\d*\.?\d+(?:e[-+]?\d+)?|\d+\.)$/i.test(plain)) return undefined;
  const value = Number(plain);
  return Number.isFinite(value) ? value : undefined;
}

/** All digits, the minus as on every screen. */
export function formatFigure(value: number): string {
  return String(value).replace("-", "−");
}
