import type { XmlText } from "../address-space/node";

const LOW = /<(?:[\w.-]+:)?Low>\s*([^<\s]+)\s*</;
const HIGH = /<(?:[\w.-]+:)?High>\s*([^<\s]+)\s*</;

/** Low and High of a Value that holds a Range (OPC 10000-8 §5.6.2); undefined when it holds none. */
export function readRange(value: XmlText): { low: number; high: number } | undefined {
  const low = Number(LOW.exec(value.xml)?.[1] ?? Number.NaN);
  const high = Number(HIGH.exec(value.xml)?.[1] ?? Number.NaN);
  return Number.isFinite(low) && Number.isFinite(high) ? { low, high } : undefined;
}
