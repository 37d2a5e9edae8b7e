/** Names of process data fields in a language. Pure, and light: the register and the sheet name sources by it. */
import type { IoddTexts, ProcessDataImage } from "~/domain/iodd/device-description";

export function pickText(texts: IoddTexts | undefined, language = "en"): string | undefined {
  return texts?.[language] ?? Object.values(texts ?? {})[0];
}

/** The name that the description gives a field; subindex 0 is the whole. Undefined where it gives none. */
export function findFieldName(image: ProcessDataImage, subindex: number, language?: string): string | undefined {
  const items = image.type.kind === "RecordT" ? image.type.items : [];
  const item = items.find((one) => one.subindex === subindex);
  return pickText(item?.name ?? (subindex === 0 ? image.name : undefined), language);
}
