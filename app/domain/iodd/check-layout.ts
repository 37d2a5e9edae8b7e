/** Whether the fields of a process data image fit into its bits and keep clear of each other. */
import { problem } from "../core/result";
import type { XmlElement } from "../core/xml-tree";
import type { ProcessDataImage } from "./device-description";
import type { IoddContext } from "./iodd-context";
import { countBits } from "./read-datatypes";

/** 32 octets a direction (IO-Link Interface Specification; domain notes: several public master manuals). */
export const MAX_PROCESS_DATA_BITS = 256;

/** Reports what does not fit; nothing is thrown away, since a wrong field must still be seen. */
export function checkLayout(context: IoddContext, image: ProcessDataImage, element: XmlElement): void {
  const { id, bitLength, type } = image;
  if (bitLength > MAX_PROCESS_DATA_BITS)
    context.report(problem("iodd.process-data-too-long", { id, bitLength }), element);
  if (bitLength % 8 !== 0) context.report(problem.hint("iodd.not-whole-octets", { id, bitLength }), element);
  const counted = countBits(type);
  if (counted !== bitLength && !(type.kind === "BooleanT" && bitLength <= 8)) {
    context.report(problem.warning("iodd.length-mismatch", { id, stated: bitLength, counted }), element);
  }
  if (type.kind !== "RecordT") return;

  const owner = new Map<number, number>();
  const overlaps = new Set<string>();
  const seen = new Set<number>();
  for (const { subindex, bitOffset, type: itemType } of type.items) {
    if (seen.has(subindex)) context.report(problem("iodd.duplicate-subindex", { id, subindex }), element);
    seen.add(subindex);
    const end = bitOffset + countBits(itemType);
    if (end > bitLength) {
      context.report(problem("iodd.field-outside", { id, subindex, from: bitOffset, to: end - 1, bitLength }), element);
    }
    for (let bit = bitOffset; bit < Math.min(end, bitLength); bit++) {
      const other = owner.get(bit);
      const pair = `${other}/${subindex}`;
      if (other !== undefined && other !== subindex && !overlaps.has(pair)) {
        overlaps.add(pair);
        context.report(problem.warning("iodd.field-overlap", { id, first: other, second: subindex }), element);
      }
      owner.set(bit, subindex);
    }
  }
}
