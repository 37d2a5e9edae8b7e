/**
 * Whether a value has the shape of an attribute that stands for itself. It says the same as the schema of the attribute,
 * which a test holds, without the schemas: a window refuses a wrong value before it has loaded them.
 */
import type { ArgumentDescription } from "../address-space/node";
import { parseNodeId } from "../address-space/node-id";
import { isWritableText } from "../nodeset/values/scalar-text";
import { readFragment } from "../nodeset/values/xml-fragment";

type Test = (value: unknown) => boolean;
type Shape = Readonly<Record<string, Test>>;

const MAX_TEXT = 16_000_000;
const XML_NAME = /^[\p{L}_][\p{L}\p{N}_.-]*(?::[\p{L}_][\p{L}\p{N}_.-]*)?$/u;

const isBoolean: Test = (value) => typeof value === "boolean";
const isNumber: Test = (value) => typeof value === "number" && Number.isFinite(value);
const isText: Test = (value) => typeof value === "string" && value.length <= MAX_TEXT && isWritableText(value);
const isKey: Test = (value) => typeof value === "string" && parseNodeId(value, []).ok;
const isUint32 = isWithin(4_294_967_295);
const isUint16 = isWithin(65_535);

function isWithin(highest: number): Test {
  return (value) => Number.isSafeInteger(value) && (value as number) >= 0 && (value as number) <= highest;
}

function isOneOf(...allowed: readonly string[]): Test {
  return (value) => allowed.includes(value as string);
}

function isListOf(test: Test): Test {
  return (value) => Array.isArray(value) && value.every(test);
}

function isPlainObject(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}

/** Objects with these members and no others. */
function isObjectOf(required: Shape, optional: Shape = {}): Test {
  return (value) =>
    isPlainObject(value) &&
    Object.entries(required).every(([name, test]) => test(value[name])) &&
    Object.entries(value).every(
      ([name, part]) => name in required || (part === undefined ? name in optional : optional[name]?.(part)),
    );
}

function isRecordOf(isName: (name: string) => boolean): Test {
  return (value) => isPlainObject(value) && Object.entries(value).every(([name, part]) => isName(name) && isText(part));
}

const isXmlText: Test = (value) =>
  isObjectOf(
    { xml: isText },
    {
      prefixes: isRecordOf((name) => name === "" || XML_NAME.test(name)),
      attributes: isRecordOf((name) => XML_NAME.test(name)),
    },
  )(value) && readFragment(value as Parameters<typeof readFragment>[0]).ok;
const isLocalizedTexts = isListOf(isObjectOf({ text: isText }, { locale: isText }));

const TESTS = {
  symbolicName: isText,
  category: isListOf(isText),
  documentation: isText,
  releaseStatus: isOneOf("Released", "Draft", "Deprecated"),
  writeMask: isUint32,
  userWriteMask: isUint32,
  accessRestrictions: isUint16,
  hasNoPermissions: isBoolean,
  rolePermissions: isListOf(isObjectOf({ role: isKey, permissions: isUint32 })),
  extensions: isListOf(isXmlText),
  designToolOnly: isBoolean,
  eventNotifier: isUint32,
  containsNoLoops: isBoolean,
  accessLevel: isUint32,
  userAccessLevel: isUint32,
  minimumSamplingInterval: isNumber,
  historizing: isBoolean,
  translations: isListOf(isXmlText),
  executable: isBoolean,
  userExecutable: isBoolean,
  methodDeclaration: isKey,
  argumentDescriptions: isListOf(
    isObjectOf({ name: isText, description: isLocalizedTexts } satisfies Record<keyof ArgumentDescription, Test>),
  ),
  isAbstract: isBoolean,
  purpose: isOneOf("Normal", "ServicesOnly", "CodeGenerator"),
  symmetric: isBoolean,
} as const satisfies Shape;

export type PlainAttribute = keyof typeof TESTS;

/** Attributes that stand for themselves: no other attribute and no other node changes with them. */
export const PLAIN_ATTRIBUTES = Object.keys(TESTS) as readonly PlainAttribute[];

export function isAttributeValue(attribute: PlainAttribute, value: unknown): boolean {
  return TESTS[attribute](value);
}
