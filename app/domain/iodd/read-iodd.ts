/**
 * IODD → device description. Reads IODD 1.1 (http://www.io-link.com/IODD/2010/10) and 1.0.1 (…/2009/11). What could be
 * read is answered together with all problems, each with line and column; only a file that is no IODD at all, or names no
 * vendor and device, fails.
 */
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import { findChild, listChildren, readXmlTree, type XmlElement, type XmlTreeLimits } from "../core/xml-tree";
import type { DeviceDescription, DeviceVariant, IoddErrorType, IoddEvent } from "./device-description";
import { countStampCrc } from "./crc32";
import { IoddContext, readTextTables } from "./iodd-context";
import { DatatypeReader } from "./read-datatypes";
import { readCommunication } from "./read-communication";
import { readMenus } from "./read-menus";
import { readProcessData } from "./read-process-data";
import { readVariables } from "./read-variables";
import { findStandardEvent } from "./standard-definitions";

const SCHEMA_VERSIONS: Readonly<Record<string, "1.0.1" | "1.1">> = {
  "http://www.io-link.com/IODD/2010/10": "1.1",
  "http://www.io-link.com/IODD/2009/11": "1.0.1",
};

export type ReadIoddOptions = {
  /** Texts of further languages: the package's `…-IODD1.1-de.xml` and the like. */
  readonly languageFiles?: readonly string[];
  /** The file's octets as uploaded, for the stamp's CRC. */
  readonly octets?: Uint8Array;
  readonly limits?: XmlTreeLimits;
};

export function readIodd(text: string, options: ReadIoddOptions = {}): Result<DeviceDescription> {
  const tree = readXmlTree(text, options.limits);
  if (!tree.ok) return tree;
  const root = tree.value;
  const schemaVersion = SCHEMA_VERSIONS[root.namespaceUri];
  if (root.name !== "IODevice" || schemaVersion === undefined) {
    const data = { name: root.name, namespace: root.namespaceUri || "no namespace" };
    return fail(problem("iodd.wrong-root", data, { line: root.line, column: root.column }));
  }
  const languages = readLanguageFiles(options);
  const context = new IoddContext(readTextTables([root, ...languages.roots]));
  for (const found of languages.problems) context.report(found);
  const identity = findChild(root, "ProfileBody", "DeviceIdentity");
  if (!identity)
    return fail(problem("iodd.missing-element", { name: "DeviceIdentity" }, { line: root.line, column: root.column }));
  const description = readDevice(context, root, identity, schemaVersion);
  checkStamp(context, description, options.octets);
  return ok(description, context.problems);
}

function readLanguageFiles(options: ReadIoddOptions): { roots: XmlElement[]; problems: Problem[] } {
  const roots: XmlElement[] = [];
  const problems: Problem[] = [];
  for (const text of options.languageFiles ?? []) {
    const tree = readXmlTree(text, options.limits);
    if (tree.ok) roots.push(tree.value);
    else problems.push(...tree.problems);
  }
  return { roots, problems };
}

function readDevice(
  context: IoddContext,
  root: XmlElement,
  identity: XmlElement,
  schemaVersion: DeviceDescription["schemaVersion"],
): DeviceDescription {
  const document = findChild(root, "DocumentInfo");
  const functions = findChild(root, "ProfileBody", "DeviceFunction");
  const datatypes = new DatatypeReader(context, findChild(functions, "DatatypeCollection"));
  const userInterface = findChild(functions, "UserInterface");
  const menus = readMenus(context, userInterface);
  const variables = readVariables(context, datatypes, findChild(functions, "VariableCollection"), menus.shown);
  const features = findChild(functions, "Features");
  const stamp = findChild(root, "Stamp")?.attributes.crc;
  const copyright = document?.attributes.copyright;
  const vendorLogo = findChild(identity, "VendorLogo")?.attributes.name;
  const communication = readCommunication(context, findChild(root, "CommNetworkProfile"));
  return {
    schemaVersion,
    documentVersion: document?.attributes.version ?? "",
    releaseDate: document?.attributes.releaseDate ?? "",
    ...(copyright === undefined ? {} : { copyright }),
    vendorId: context.requireInteger(identity, "vendorId", 1, 65_535),
    deviceId: context.requireInteger(identity, "deviceId", 1, 16_777_215),
    vendorName: context.requireAttribute(identity, "vendorName"),
    ...withTexts(context, identity, { VendorText: "vendorText", VendorUrl: "vendorUrl" }),
    ...withTexts(context, identity, { DeviceName: "deviceName", DeviceFamily: "deviceFamily" }),
    ...(vendorLogo === undefined ? {} : { vendorLogo }),
    variants: readVariants(context, identity),
    profileCharacteristic: (features?.attributes.profileCharacteristic ?? "").split(/\s+/).filter(Boolean).map(Number),
    features: {
      blockParameter: features?.attributes.blockParameter === "true",
      dataStorage: features?.attributes.dataStorage === "true",
    },
    variables,
    processData: readProcessData(context, datatypes, functions, variables),
    events: readEvents(context, findChild(functions, "EventCollection")),
    errorTypes: readErrorTypes(context, findChild(functions, "ErrorTypeCollection")),
    menus: menus.menus,
    ...(communication ? { communication } : {}),
    languages: [...context.texts.keys()],
    ...(stamp !== undefined && /^\d+$/.test(stamp) ? { stamp: { crc: Number(stamp) } } : {}),
  };
}

function withTexts(
  context: IoddContext,
  element: XmlElement,
  names: Readonly<Record<string, string>>,
): Record<string, Readonly<Record<string, string>>> {
  const found: Record<string, Readonly<Record<string, string>>> = {};
  for (const [child, key] of Object.entries(names)) {
    const texts = context.findTexts(element, child);
    if (texts) found[key] = texts;
  }
  return found;
}

function readVariants(context: IoddContext, identity: XmlElement): DeviceVariant[] {
  const collection = findChild(identity, "DeviceVariantCollection");
  return (collection ? listChildren(collection, "DeviceVariant") : []).map((variant) => {
    const { deviceSymbol, deviceIcon } = variant.attributes;
    return {
      productId: context.requireAttribute(variant, "productId"),
      ...withTexts(context, variant, { Name: "name", ProductName: "name", Description: "description" }),
      ...(deviceSymbol === undefined ? {} : { deviceSymbol }),
      ...(deviceIcon === undefined ? {} : { deviceIcon }),
    };
  });
}

const EVENT_TYPES = ["Notification", "Warning", "Error"] as const;

function readEvents(context: IoddContext, collection: XmlElement | undefined): IoddEvent[] {
  return (collection?.children ?? []).map((element): IoddEvent => {
    const code = context.requireInteger(element, "code", 0, 65_535);
    if (element.name === "StdEventRef") {
      const known = findStandardEvent(code);
      return { code, isStandard: true, ...(known ? { type: known[0], name: { en: known[1] } } : {}) };
    }
    const type = EVENT_TYPES.find((t) => t === element.attributes.type);
    return {
      code,
      isStandard: false,
      ...(type ? { type } : {}),
      ...withTexts(context, element, { Name: "name", Description: "description" }),
    };
  });
}

function readErrorTypes(context: IoddContext, collection: XmlElement | undefined): IoddErrorType[] {
  return (collection?.children ?? []).map((element) => ({
    code: context.requireInteger(element, "code", 0, 255),
    additionalCode: context.requireInteger(element, "additionalCode", 0, 255),
    isStandard: element.name === "StdErrorTypeRef",
    ...withTexts(context, element, { Name: "name" }),
  }));
}

function checkStamp(context: IoddContext, description: DeviceDescription, octets: Uint8Array | undefined): void {
  if (!octets || !description.stamp) return;
  const counted = countStampCrc(octets);
  if (counted !== undefined && counted !== description.stamp.crc) {
    context.report(problem.warning("iodd.crc", { stated: description.stamp.crc, counted }));
  }
}
