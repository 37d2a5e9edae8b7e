import { canConvert, convert } from "../units/units";
import type { FindConversion } from "./transform";

/** Conversion between two UN/CEFACT units of one quantity; undefined where they measure different things. */
export const findConversion: FindConversion = (from, to) => {
  if (!canConvert(from, to)) return undefined;
  return (value) => {
    const converted = convert(value, from, to);
    return converted.ok ? converted.value : Number.NaN;
  };
};
