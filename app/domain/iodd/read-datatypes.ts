/** Datatypes of an IODD: built-in ones, named ones and references to them (IODD 1.1, Datatypes). */
import { problem } from "../core/result";
import { findChild, listChildren, type XmlElement } from "../core/xml-tree";
import type {
  IoddDatatype,
  IoddScalar,
  IoddSimpleDatatype,
  RecordItem,
  SingleValue,
  ValueRange,
} from "./device-description";
import type { IoddContext } from "./iodd-context";

/** Process data ends at 32 octets, an ISDU at 232; the largest record any of them holds stays far below this. */
const MAX_RECORD_BITS = 232 * 8;

const FALLBACK: IoddSimpleDatatype = { kind: "OctetStringT", fixedLength: 1 };

export class DatatypeReader {
  readonly #context: IoddContext;
  readonly #named = new Map<string, XmlElement>();
  readonly #resolving = new Set<string>();

  constructor(context: IoddContext, collection: XmlElement | undefined) {
    this.#context = context;
    for (const element of collection ? listChildren(collection, "Datatype") : []) {
      const id = element.attributes.id ?? "";
      if (this.#named.has(id)) context.report(problem.warning("iodd.duplicate-id", { id }), element);
      else this.#named.set(id, element);
    }
  }

  /** The datatype of an owner that has Datatype, SimpleDatatype or DatatypeRef. */
  readOf(owner: XmlElement): IoddDatatype {
    const direct = findChild(owner, "Datatype") ?? findChild(owner, "SimpleDatatype");
    if (direct) return this.read(direct);
    const reference = findChild(owner, "DatatypeRef");
    if (reference) return this.#resolve(reference);
    this.#context.report(problem("iodd.missing-element", { name: "Datatype" }), owner);
    return FALLBACK;
  }

  #resolve(reference: XmlElement): IoddDatatype {
    const id = this.#context.requireAttribute(reference, "datatypeId");
    const element = this.#named.get(id);
    if (!element) {
      this.#context.report(problem("iodd.unresolved-datatype", { id }), reference);
      return FALLBACK;
    }
    if (this.#resolving.has(id)) {
      this.#context.report(problem("iodd.circular-datatype", { id }), reference);
      return FALLBACK;
    }
    this.#resolving.add(id);
    const type = this.read(element);
    this.#resolving.delete(id);
    return type;
  }

  read(element: XmlElement): IoddDatatype {
    const kind = (element.attributes["xsi:type"] ?? "").replace(/^.*:/, "");
    const bits = (): number => this.#context.requireInteger(element, "bitLength", 2, 64);
    switch (kind) {
      case "BooleanT":
        return { kind, ...this.#readValued(element, toBoolean) };
      case "UIntegerT":
      case "IntegerT":
        return { kind, bitLength: bits(), ...this.#readValued(element, toInteger) };
      case "Float32T":
        return { kind, ...this.#readValued(element, Number) };
      case "StringT":
        return {
          kind,
          fixedLength: this.#context.requireInteger(element, "fixedLength", 1, 232),
          encoding: element.attributes.encoding === "US-ASCII" ? "US-ASCII" : "UTF-8",
        };
      case "OctetStringT":
        return { kind, fixedLength: this.#context.requireInteger(element, "fixedLength", 1, 232) };
      case "TimeT":
      case "TimeSpanT":
      case "ProcessDataInUnionT":
      case "ProcessDataOutUnionT":
        return { kind };
      case "ArrayT":
        return {
          kind,
          count: this.#context.requireInteger(element, "count", 1, 255),
          element: this.#simple(this.readOf(element), element),
        };
      case "RecordT":
        return {
          kind,
          bitLength: this.#context.requireInteger(element, "bitLength", 1, MAX_RECORD_BITS),
          items: listChildren(element, "RecordItem").map((item) => this.#readItem(item)),
        };
      default:
        this.#context.report(problem("iodd.unknown-datatype", { type: kind }), element);
        return FALLBACK;
    }
  }

  #readItem(item: XmlElement): RecordItem {
    const restriction = item.attributes.accessRightRestriction;
    const name = this.#context.findTexts(item, "Name");
    const description = this.#context.findTexts(item, "Description");
    return {
      subindex: this.#context.requireInteger(item, "subindex", 1, 255),
      bitOffset: this.#context.requireInteger(item, "bitOffset", 0, MAX_RECORD_BITS),
      type: this.#simple(this.readOf(item), item),
      ...(name ? { name } : {}),
      ...(description ? { description } : {}),
      ...(restriction === "ro" || restriction === "wo" ? { accessRightRestriction: restriction } : {}),
    };
  }

  #simple(type: IoddDatatype, element: XmlElement): IoddSimpleDatatype {
    switch (type.kind) {
      case "RecordT":
      case "ArrayT":
      case "ProcessDataInUnionT":
      case "ProcessDataOutUnionT":
        this.#context.report(problem("iodd.nested-record", { kind: type.kind }), element);
        return FALLBACK;
      default:
        return type;
    }
  }

  #readValued(
    element: XmlElement,
    parse: (text: string) => IoddScalar,
  ): { singleValues: SingleValue[]; ranges: ValueRange[] } {
    const singleValues = listChildren(element, "SingleValue").map((single) => {
      const name = this.#context.findTexts(single, "Name");
      return { value: parse(single.attributes.value ?? ""), ...(name ? { name } : {}) };
    });
    const ranges = listChildren(element, "ValueRange").map((range) => {
      const name = this.#context.findTexts(range, "Name");
      const lower = Number(this.#context.requireAttribute(range, "lowerValue"));
      const upper = Number(this.#context.requireAttribute(range, "upperValue"));
      return { lower, upper, ...(name ? { name } : {}) };
    });
    return { singleValues, ranges };
  }
}

function toBoolean(text: string): boolean {
  return text === "true" || text === "1";
}

function toInteger(text: string): number | string {
  const value = Number(text);
  return Number.isSafeInteger(value) ? value : text;
}

/** The bits of a datatype inside a record or as a whole image. */
export function countBits(type: IoddDatatype): number {
  switch (type.kind) {
    case "BooleanT":
      return 1;
    case "UIntegerT":
    case "IntegerT":
    case "RecordT":
      return type.bitLength;
    case "Float32T":
      return 32;
    case "StringT":
    case "OctetStringT":
      return type.fixedLength * 8;
    case "TimeT":
    case "TimeSpanT":
      return 64;
    case "ArrayT":
      return type.count * countBits(type.element);
    case "ProcessDataInUnionT":
    case "ProcessDataOutUnionT":
      return 0;
  }
}
