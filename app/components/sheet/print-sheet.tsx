import { flushSync } from "react-dom";
import { createRoot } from "react-dom/client";
import { SheetPicture, type PictureFacts } from "./sheet-picture";

let getPicture: (() => PictureFacts) | undefined;
let endPrinting: (() => void) | undefined;

/** Prints the sheet alone, as large as the paper, with its title block; the page stays as it was. Loaded when it is asked for. */
export function printSheet(picture: () => PictureFacts): void {
  if (!getPicture) {
    window.addEventListener("beforeprint", begin);
    window.addEventListener("afterprint", () => endPrinting?.());
  }
  getPicture = picture;
  window.print();
}

/** Also for the browser's own command, once a sheet was printed, as long as a sheet is on the page. */
function begin(): void {
  if (!getPicture || !document.querySelector(".sheet")) return;
  const facts = getPicture();
  const holder = document.createElement("div");
  holder.className = "printed-sheet";
  const root = createRoot(holder);
  flushSync(() => root.render(<SheetPicture facts={facts} width="100%" height="100%" />));
  document.body.append(holder);
  endPrinting = () => {
    endPrinting = undefined;
    root.unmount();
    holder.remove();
  };
}
