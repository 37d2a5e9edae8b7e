/**
 * What an IODD says about a product. Words are those of the IO Device Description 1.1 (IO-Link Community): element and
 * attribute names are kept where a name is needed. All is plain JSON; integers above 2⁵³ are kept as decimal text.
 */

/** Texts by language tag; the primary language comes first. */
export type IoddTexts = Readonly<Record<string, string>>;

/** A number, or its decimal text where a double cannot hold it, or true/false, or text. */
export type IoddScalar = number | boolean | string;

/** One named value: an enumeration text or a special value ("no data"). Stands on the raw value, before any scaling. */
export type SingleValue = { readonly value: IoddScalar; readonly name?: IoddTexts };

export type ValueRange = { readonly lower: number; readonly upper: number; readonly name?: IoddTexts };

type Valued = { readonly singleValues: readonly SingleValue[]; readonly ranges: readonly ValueRange[] };

export type IoddSimpleDatatype =
  | ({ readonly kind: "BooleanT" } & Valued)
  /** 2 … 64 bit. */
  | ({ readonly kind: "UIntegerT"; readonly bitLength: number } & Valued)
  /** 2 … 64 bit, two's complement. */
  | ({ readonly kind: "IntegerT"; readonly bitLength: number } & Valued)
  | ({ readonly kind: "Float32T" } & Valued)
  | { readonly kind: "StringT"; readonly fixedLength: number; readonly encoding: "UTF-8" | "US-ASCII" }
  | { readonly kind: "OctetStringT"; readonly fixedLength: number }
  | { readonly kind: "TimeT" }
  | { readonly kind: "TimeSpanT" };

export type RecordItem = {
  /** 1 … 255. */
  readonly subindex: number;
  /** Counted from the least significant bit of the last octet of the block. */
  readonly bitOffset: number;
  readonly type: IoddSimpleDatatype;
  readonly name?: IoddTexts;
  readonly description?: IoddTexts;
  readonly accessRightRestriction?: "ro" | "wo";
};

export type IoddDatatype =
  | IoddSimpleDatatype
  | { readonly kind: "RecordT"; readonly bitLength: number; readonly items: readonly RecordItem[] }
  | { readonly kind: "ArrayT"; readonly count: number; readonly element: IoddSimpleDatatype }
  /** Index 40 and 41: the process data image itself. */
  | { readonly kind: "ProcessDataInUnionT" }
  | { readonly kind: "ProcessDataOutUnionT" };

/** How a value is shown: physical = raw × gradient + offset, in the unit of `unitCode` (1000 … 1709, 1997 none). */
export type DisplayInfo = {
  readonly displayFormat?: string;
  readonly gradient?: number;
  readonly offset?: number;
  readonly unitCode?: number;
};

export type Direction = "in" | "out";

/** The bytes of one direction. `info` holds scaling and unit by subindex; 0 is the whole of a plain datatype. */
export type ProcessDataImage = {
  readonly id: string;
  readonly bitLength: number;
  readonly type: IoddDatatype;
  readonly name?: IoddTexts;
  readonly info: Readonly<Record<number, DisplayInfo>>;
};

/** One layout; where several exist, exactly one is active: the one whose condition meets the parameter's present value. */
export type ProcessData = {
  readonly id: string;
  readonly condition?: { readonly variableId: string; readonly subindex?: number; readonly value: string };
  readonly in?: ProcessDataImage;
  readonly out?: ProcessDataImage;
};

export type IoddVariable = {
  readonly id: string;
  readonly index: number;
  readonly accessRights: "ro" | "rw" | "wo";
  readonly type: IoddDatatype;
  readonly isStandard: boolean;
  readonly defaultValue?: string;
  /** Defaults of record items by subindex. */
  readonly itemDefaults?: Readonly<Record<number, string>>;
  readonly name?: IoddTexts;
  readonly description?: IoddTexts;
  readonly dynamic?: boolean;
  readonly modifiesOtherVariables?: boolean;
  readonly excludedFromDataStorage?: boolean;
  /** Every way a menu shows it, with subindex 0 for the whole; menus may differ. */
  readonly shownAs: readonly (DisplayInfo & { readonly subindex: number; readonly menuId: string })[];
};

export type IoddEvent = {
  readonly code: number;
  readonly type?: "Notification" | "Warning" | "Error";
  readonly isStandard: boolean;
  readonly name?: IoddTexts;
  readonly description?: IoddTexts;
};

export type IoddErrorType = {
  readonly code: number;
  readonly additionalCode: number;
  readonly isStandard: boolean;
  readonly name?: IoddTexts;
};

export type DeviceVariant = {
  readonly productId: string;
  readonly name?: IoddTexts;
  readonly description?: IoddTexts;
  readonly deviceSymbol?: string;
  readonly deviceIcon?: string;
};

export type IoddMenu = {
  readonly id: string;
  readonly name?: IoddTexts;
  readonly entries: readonly (
    | { readonly kind: "variable"; readonly variableId: string; readonly subindex?: number }
    | { readonly kind: "menu"; readonly menuId: string }
  )[];
};

export type DeviceConnection = {
  readonly kind: string;
  readonly productIds: readonly string[];
  readonly wires: readonly { readonly wire: string; readonly function: string }[];
};

export type DeviceDescription = {
  readonly schemaVersion: "1.0.1" | "1.1";
  readonly documentVersion: string;
  readonly releaseDate: string;
  readonly copyright?: string;
  readonly vendorId: number;
  readonly deviceId: number;
  readonly vendorName: string;
  readonly vendorText?: IoddTexts;
  readonly vendorUrl?: IoddTexts;
  readonly vendorLogo?: string;
  readonly deviceName?: IoddTexts;
  readonly deviceFamily?: IoddTexts;
  readonly variants: readonly DeviceVariant[];
  /** Decimal profile identifiers and function classes. */
  readonly profileCharacteristic: readonly number[];
  readonly features: { readonly blockParameter: boolean; readonly dataStorage: boolean };
  readonly variables: readonly IoddVariable[];
  readonly processData: readonly ProcessData[];
  readonly events: readonly IoddEvent[];
  readonly errorTypes: readonly IoddErrorType[];
  readonly menus: readonly IoddMenu[];
  readonly communication?: {
    readonly ioLinkRevision?: string;
    readonly bitrate?: "COM1" | "COM2" | "COM3";
    /** Microseconds. */
    readonly minCycleTime?: number;
    readonly sioSupported?: boolean;
    readonly connections: readonly DeviceConnection[];
  };
  /** Language tags, primary first. */
  readonly languages: readonly string[];
  readonly stamp?: { readonly crc: number };
};
