/**
 * "oil level %" → a member. What engineers say when they list signals: a name, perhaps a unit, perhaps a range. Pure; the
 * unit table is handed in. Words of the trade choose the type where no unit does (common practice, no source).
 */
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardDataType, StandardType } from "~/domain/address-space/standard-ids";
import type { Range } from "~/domain/nodeset/values/standard-values";

/** What the phrase means; `unit` is what the lookup answered. */
export type SpokenMember<Unit> = {
  readonly kind: "Variable" | "Method" | "Object";
  readonly name: string;
  readonly typeDefinition: NodeKey;
  readonly dataType?: NodeKey;
  readonly unit?: Unit;
  readonly range?: Range;
  readonly isOptional?: true;
};

export type SpokenType = { readonly key: NodeKey; readonly kind: "DataType" | "VariableType" | "ObjectType" };

/** Finds a type of the loaded models by exactly this name. */
export type TypeLookup = (name: string) => SpokenType | undefined;

/** Finds a unit by exactly this text: symbol, name or code. */
export type UnitLookup<Unit> = (text: string) => Unit | undefined;

type Habit = { readonly words: readonly string[]; readonly typeDefinition: NodeKey; readonly dataType: NodeKey };

const HABITS: readonly Habit[] = [
  { words: ["counter", "count", "total", "pieces", "cycles"], typeDefinition: StandardType.BaseDataVariableType, dataType: StandardDataType.UInt32 },
  { words: ["alarm", "on", "off", "enabled", "active", "running", "open", "closed", "ok", "ready", "present", "limit", "switch"], typeDefinition: StandardType.TwoStateDiscreteType, dataType: StandardDataType.Boolean },
  { words: ["number", "index", "code"], typeDefinition: StandardType.BaseDataVariableType, dataType: StandardDataType.UInt16 },
  { words: ["text", "name", "message", "comment", "tag", "id", "serial"], typeDefinition: StandardType.BaseDataVariableType, dataType: StandardDataType.String },
  { words: ["time", "date", "timestamp", "since"], typeDefinition: StandardType.BaseDataVariableType, dataType: StandardDataType.DateTime },
];

const ANALOG_WORDS = ["temperature", "pressure", "speed", "level", "position", "distance", "flow", "vibration", "humidity", "voltage", "current", "power", "energy", "torque", "force", "weight", "mass", "length", "angle", "set-point", "setpoint", "deviation", "factor"];

const QUANTITY_WORDS = new Set([...ANALOG_WORDS, ...HABITS.flatMap((habit) => habit.words)]);

const NUMBER = String.raw`[-−+]?\d+(?:[.,]\d+)?`;
const RANGE = new RegExp(String.raw`(?:^|\s)(${NUMBER})\s*(?:…|\.{2,3}|–|to|bis)\s*(${NUMBER})(?=\s|$|[^\d.,])`, "i");

/**
 * Undefined for a phrase without a name. Names of types among the words say type and DataType, and `optional` says that not
 * every machine has the member: `active energy Double kWh 0..1000000`, `stack light BasicStacklightType optional`.
 */
export function parsePhrase<Unit>(phrase: string, findUnit: UnitLookup<Unit>, findType: TypeLookup = () => undefined): SpokenMember<Unit> | undefined {
  const { rest: spokenText, range } = takeRange(phrase.trim());
  const { rest, types, isOptional } = takeTypes(spokenText, findType);
  const { words, unit } = takeUnit(rest, findUnit);
  const isMethod = /\(\s*\)\s*$/.test(rest);
  const isObject = rest.endsWith("/");
  const name = toMemberName(words.map((word) => word.replace(/[()/]+$/, "")));
  if (name === "") return undefined;
  const shared = { name, ...(isOptional ? { isOptional } : {}) };
  const objectType = types.find((type) => type.kind === "ObjectType")?.key;
  if (isMethod) return { kind: "Method", ...shared, typeDefinition: StandardType.BaseObjectType };
  if (isObject || objectType !== undefined) return { kind: "Object", ...shared, typeDefinition: objectType ?? StandardType.BaseObjectType };
  const meant = guessVariable(words, unit !== undefined || range !== undefined);
  const dataType = types.find((type) => type.kind === "DataType")?.key;
  const typeDefinition = types.find((type) => type.kind === "VariableType")?.key;
  return {
    kind: "Variable",
    ...shared,
    // A named DataType without unit or range is no measured value, whatever the words sound like.
    typeDefinition: typeDefinition ?? (dataType !== undefined && unit === undefined && !range ? StandardType.BaseDataVariableType : meant.typeDefinition),
    ...(dataType !== undefined ? { dataType } : meant.dataType === undefined ? {} : { dataType: meant.dataType }),
    ...(unit === undefined ? {} : { unit }),
    ...(range ? { range } : {}),
  };
}

function guessVariable(words: readonly string[], isMeasured: boolean): { typeDefinition: NodeKey; dataType?: NodeKey } {
  const analog = { typeDefinition: StandardType.AnalogUnitRangeType, dataType: StandardDataType.Float };
  if (isMeasured) return analog;
  const spoken = words.map((word) => word.toLowerCase());
  const habit = HABITS.find((h) => h.words.some((word) => spoken.includes(word)));
  if (habit) return { typeDefinition: habit.typeDefinition, dataType: habit.dataType };
  return spoken.some((word) => ANALOG_WORDS.includes(word)) ? analog : { typeDefinition: StandardType.BaseDataVariableType };
}

/** Takes `optional` and the names of types out; the first word is always of the name. */
function takeTypes(text: string, findType: TypeLookup): { rest: string; types: SpokenType[]; isOptional?: true } {
  const types: SpokenType[] = [];
  let isOptional = false;
  const [first = "", ...others] = text.split(/\s+/);
  const rest = others.filter((word) => {
    if (word.toLowerCase() === "optional") isOptional = true;
    else {
      // Types are written with a capital, as no other word of a phrase needs be.
      const found = /^\p{Lu}/u.test(word) ? findType(word) : undefined;
      if (!found) return true;
      types.push(found);
    }
    return false;
  });
  return { rest: [first, ...rest].join(" "), types, ...(isOptional ? { isOptional: true as const } : {}) };
}

function takeRange(phrase: string): { rest: string; range?: Range } {
  const match = RANGE.exec(phrase);
  if (!match) return { rest: phrase };
  const [whole, low = "", high = ""] = match;
  const range = { low: toNumber(low), high: toNumber(high) };
  if (!(range.low < range.high)) return { rest: phrase };
  return { rest: `${phrase.slice(0, match.index)} ${phrase.slice(match.index + whole.length)}`.trim(), range };
}

/** Reads `−1,5` and `+3.2`. */
export function toNumber(text: string): number {
  return Number(text.trim().replace("−", "-").replace(",", "."));
}

/** The longest run of words at the end that names a unit; at least one word stays for the name. */
function takeUnit<Unit>(text: string, findUnit: UnitLookup<Unit>): { words: string[]; unit?: Unit } {
  const words = text.split(/\s+/).filter((word) => word !== "");
  for (let take = Math.min(4, words.length - 1); take >= 1; take--) {
    const tail = words.slice(words.length - take);
    // A word that names what is measured is no unit, although some tables know it as one.
    if (take === 1 && QUANTITY_WORDS.has((tail[0] ?? "").toLowerCase())) break;
    const unit = findUnit(tail.join(" ").replace(/^[[(](.*)[\])]$/, "$1"));
    if (unit !== undefined) return { words: words.slice(0, words.length - take), unit };
  }
  return { words };
}

/** `oil level` → `OilLevel`; capitals inside a word stay. */
export function toMemberName(words: readonly string[]): string {
  return words
    .flatMap((word) => word.split(/[^\p{L}\p{N}]+/u))
    .filter((word) => word !== "")
    .map((word) => (word[0] ?? "").toUpperCase() + word.slice(1))
    .join("");
}
