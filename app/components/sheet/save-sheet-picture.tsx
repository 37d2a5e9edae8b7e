/** A sheet as a file of its own: SVG as it is drawn, PNG painted from it at twice the size. Loaded when it is asked for. */
import { flushSync } from "react-dom";
import { createRoot } from "react-dom/client";
import interUrl from "@fontsource-variable/inter/files/inter-latin-wght-normal.woff2?url";
import interItalicUrl from "@fontsource-variable/inter/files/inter-latin-wght-italic.woff2?url";
import monoUrl from "@fontsource-variable/jetbrains-mono/files/jetbrains-mono-latin-wght-normal.woff2?url";
import { measurePicture, SheetPicture, type PictureFacts } from "./sheet-picture";

const SCALE = 2;
/** What browsers can hold in one canvas. */
const MOST_PIXELS = 16_000;

/** Answers why it could not be saved; undefined when it was. */
export async function saveSheetPicture(kind: "svg" | "png", facts: PictureFacts): Promise<string | undefined> {
  const svg = await writeSvg(facts);
  if (kind === "svg") return download(new Blob([svg], { type: "image/svg+xml" }), `${facts.name}.svg`);
  const box = measurePicture(facts);
  const png = await paint(svg, box.width, box.height);
  return png ? download(png, `${facts.name}.png`) : "This browser could not paint the sheet. Save it as SVG instead.";
}

/** The picture as text with its fonts inside, so that it looks the same wherever it is opened. */
async function writeSvg(facts: PictureFacts): Promise<string> {
  const holder = document.createElement("div");
  const root = createRoot(holder);
  flushSync(() => root.render(<SheetPicture facts={facts} />));
  const picture = holder.querySelector("svg");
  const style = document.createElementNS("http://www.w3.org/2000/svg", "style");
  style.textContent = await writeFontFaces();
  picture?.prepend(style);
  const text = picture ? new XMLSerializer().serializeToString(picture) : "";
  root.unmount();
  return `<?xml version="1.0" encoding="UTF-8"?>\n${text}\n`;
}

async function writeFontFaces(): Promise<string> {
  const fonts = [
    ["Inter Variable", "normal", interUrl],
    ["Inter Variable", "italic", interItalicUrl],
    ["JetBrains Mono Variable", "normal", monoUrl],
  ] as const;
  const faces = await Promise.all(
    fonts.map(async ([family, style, url]) => {
      const answer = await fetch(url).catch(() => undefined);
      const data = answer?.ok ? await toDataUrl(await answer.blob()) : undefined;
      return data === undefined ? "" : `@font-face{font-family:"${family}";font-style:${style};font-weight:100 900;src:url(${data}) format("woff2")}`;
    }),
  );
  return faces.join("");
}

function toDataUrl(blob: Blob): Promise<string> {
  return new Promise((resolve, reject) => {
    const reader = new FileReader();
    reader.onload = () => resolve(String(reader.result));
    reader.onerror = () => reject(reader.error ?? new Error("The font could not be read"));
    reader.readAsDataURL(new Blob([blob], { type: "font/woff2" }));
  });
}

async function paint(svg: string, width: number, height: number): Promise<Blob | undefined> {
  const scale = Math.min(SCALE, MOST_PIXELS / Math.max(width, height));
  const image = new Image();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`;
  try {
    await image.decode();
  } catch {
    return undefined;
  }
  const canvas = document.createElement("canvas");
  canvas.width = Math.round(width * scale);
  canvas.height = Math.round(height * scale);
  canvas.getContext("2d")?.drawImage(image, 0, 0, canvas.width, canvas.height);
  return new Promise((resolve) => canvas.toBlob((blob) => resolve(blob ?? undefined), "image/png"));
}

function download(blob: Blob, fileName: string): undefined {
  const url = URL.createObjectURL(blob);
  const link = document.createElement("a");
  link.href = url;
  link.download = fileName;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}
