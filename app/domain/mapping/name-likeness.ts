/**
 * How alike two names are: words in common, whatever their case and way of joining, abbreviations that plants use, and
 * beginnings of words. The last word of a path counts double, since it says what the value is.
 */

/** Common practice in lists of signals; no source. */
const ABBREVIATIONS: Readonly<Record<string, string>> = {
  act: "actual",
  amp: "current",
  amps: "current",
  cnt: "counter",
  count: "counter",
  cur: "current",
  curr: "current",
  dist: "distance",
  dev: "deviation",
  en: "energy",
  err: "fault",
  error: "fault",
  freq: "frequency",
  hum: "humidity",
  kwh: "energy",
  lvl: "level",
  nr: "number",
  no: "number",
  pos: "position",
  pres: "pressure",
  press: "pressure",
  pwr: "power",
  rpm: "speed",
  sp: "setpoint",
  spd: "speed",
  stat: "status",
  temp: "temperature",
  tmp: "temperature",
  vib: "vibration",
  vel: "speed",
  velocity: "speed",
  volt: "voltage",
  colour: "color",
};

/** Words that stand in most names and tell nothing. */
const EMPTY = new Set(["sensor", "value", "process", "data", "input", "output", "the", "of", "in", "out", "pd", "act", "actual", "monitor"]);

export type Likeness = { readonly score: number; readonly words: readonly string[] };

export function compareNames(path: string, name: string): Likeness {
  const wanted = splitWords(path.split("/").at(-1) ?? "");
  const around = splitWords(path.split("/").slice(0, -1).join(" "));
  const given = splitWords(name);
  if (wanted.length === 0 || given.length === 0) return { score: 0, words: [] };
  const matched = wanted.filter((word) => given.some((other) => isAlike(word, other)));
  const context = around.filter((word) => given.some((other) => isAlike(word, other)));
  const extra = given.filter((word) => ![...wanted, ...around].some((other) => isAlike(word, other)));
  const covered = matched.length / wanted.length;
  // The word at the end says what it is: GearboxTemperature is a temperature.
  const head = wanted.at(-1);
  const hasHead = head !== undefined && matched.includes(head);
  const score = 0.55 * covered + (hasHead ? 0.35 : 0) + (context.length > 0 ? 0.1 : 0) - 0.05 * Math.min(4, extra.length);
  return { score: Math.max(0, Math.min(1, score)), words: matched };
}

export function splitWords(name: string): string[] {
  const words = name
    .replace(/([a-z])([A-Z])/g, "$1 $2")
    .replace(/([A-Za-z])(\d)/g, "$1 $2")
    .replace(/set[- ]point/gi, "setpoint")
    .toLowerCase()
    .split(/[^a-z0-9äöüß]+/)
    .map((word) => ABBREVIATIONS[word] ?? word)
    .filter((word) => word.length > 1 || /\d/.test(word));
  const telling = words.filter((word) => !EMPTY.has(word));
  return [...new Set(telling.length > 0 ? telling : words)];
}

/** The same word, its plural, or one that begins with the other (at least four letters). */
function isAlike(a: string, b: string): boolean {
  if (a === b) return true;
  const [short, long] = a.length < b.length ? [a, b] : [b, a];
  return short.length >= 4 && long.startsWith(short);
}
