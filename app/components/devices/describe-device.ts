/** A device description in words. Pure. */
import type {
  DeviceDescription,
  DisplayInfo,
  IoddErrorType,
  IoddDatatype,
  IoddScalar,
  IoddSimpleDatatype,
  IoddVariable,
  SingleValue,
} from "~/domain/iodd/device-description";
import { findIoddUnit } from "~/domain/iodd/iodd-units";
import { formatBound } from "~/domain/live/format-live";
import { formatScale, formatType } from "../frames/frame-fields";
import { pickText } from "../frames/field-name";

export type ParameterRow = {
  readonly key: string;
  readonly index: number;
  /** 0 is the whole parameter. */
  readonly subindex: number;
  readonly id: string;
  readonly name: string;
  readonly access: string;
  readonly type: string;
  readonly unit: string;
  readonly scale: string;
  readonly values: string;
  readonly defaultValue: string;
  readonly isStandard: boolean;
  readonly isDynamic: boolean;
  /** True when menus show it with different units or scalings, so that one of them must be chosen. */
  readonly hasSeveralUnits: boolean;
};

/** Parameters by index, the items of a record below it. */
export function listParameters(device: DeviceDescription, language: string): ParameterRow[] {
  return [...device.variables]
    .sort((a, b) => a.index - b.index)
    .flatMap((variable) => [
      toRow(
        variable,
        0,
        variable.type,
        pickText(variable.name, language) ?? variable.id,
        variable.defaultValue,
        language,
      ),
      ...(variable.type.kind === "RecordT"
        ? variable.type.items
            .filter((item) => item.name !== undefined || !variable.isStandard)
            .map((item) =>
              toRow(
                variable,
                item.subindex,
                item.type,
                pickText(item.name, language) ?? `item ${item.subindex}`,
                variable.itemDefaults?.[item.subindex],
                language,
                item.accessRightRestriction,
              ),
            )
        : []),
    ]);
}

function toRow(
  variable: IoddVariable,
  subindex: number,
  type: IoddDatatype,
  name: string,
  defaultValue: string | undefined,
  language: string,
  restriction?: "ro" | "wo",
): ParameterRow {
  const shown = variable.shownAs.filter((info) => info.subindex === subindex);
  const first = shown[0];
  const forms = new Set(shown.map((info) => `${info.unitCode ?? ""} ${info.gradient ?? 1} ${info.offset ?? 0}`));
  return {
    key: `${variable.index}/${subindex}`,
    index: variable.index,
    subindex,
    id: variable.id,
    name,
    access: restriction ?? variable.accessRights,
    type: formatDatatype(type),
    unit: formatUnit(first),
    scale: formatScale(first?.gradient ?? 1, first?.offset ?? 0),
    values: formatValues(type, language),
    defaultValue: defaultValue ?? "",
    isStandard: variable.isStandard,
    isDynamic: variable.dynamic === true,
    hasSeveralUnits: forms.size > 1,
  };
}

export function formatUnit(info: DisplayInfo | undefined): string {
  return info?.unitCode === undefined ? "" : (findIoddUnit(info.unitCode)?.symbol ?? `unit ${info.unitCode}`);
}

export function formatDatatype(type: IoddDatatype): string {
  switch (type.kind) {
    case "RecordT":
      return `Record, ${type.bitLength} bit`;
    case "ArrayT":
      return `${type.count} × ${formatType(type.element)}`;
    case "ProcessDataInUnionT":
      return "Process data in";
    case "ProcessDataOutUnionT":
      return "Process data out";
    default:
      return formatType(type);
  }
}

/** Ranges first, then named values: `0 … 4 000 · 32764 No data`. */
function formatValues(type: IoddDatatype, language: string): string {
  if (!hasValues(type)) return "";
  const ranges = type.ranges.map(({ lower, upper }) =>
    lower === upper ? formatBound(lower) : `${formatBound(lower)} … ${formatBound(upper)}`,
  );
  return [...ranges, ...type.singleValues.map((value) => formatSingleValue(value, language))].join(" · ");
}

function hasValues(type: IoddDatatype): type is Extract<IoddSimpleDatatype, { ranges: unknown }> {
  return "ranges" in type;
}

export function formatSingleValue(single: SingleValue, language: string): string {
  return `${formatScalar(single.value)} ${pickText(single.name, language) ?? ""}`.trim();
}

function formatScalar(value: IoddScalar): string {
  return String(value).replace("-", "−");
}

/** `0x8011` of code 128 and additional code 17. */
export function formatErrorCode({ code, additionalCode }: Pick<IoddErrorType, "code" | "additionalCode">): string {
  return `0x${code.toString(16).toUpperCase().padStart(2, "0")}${additionalCode.toString(16).toUpperCase().padStart(2, "0")}`;
}

export function formatEventCode(code: number): string {
  return `0x${code.toString(16).toUpperCase().padStart(4, "0")}`;
}

/** `2.3 ms` of microseconds. */
export function formatCycle(microseconds: number): string {
  return `${formatBound(microseconds / 1000)} ms`;
}
