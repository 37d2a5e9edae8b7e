import { useEffect, useState } from "react";
import { createPortal, flushSync } from "react-dom";
import { SheetPicture, type PictureFacts } from "./sheet-picture";

/** While the browser prints, the page is the sheet alone, as large as the paper, with its title block. */
export function PrintSheet({ getPicture }: { getPicture: () => PictureFacts }) {
  const [facts, setFacts] = useState<PictureFacts>();
  useEffect(() => {
    const begin = (): void => flushSync(() => setFacts(getPicture()));
    const end = (): void => setFacts(undefined);
    window.addEventListener("beforeprint", begin);
    window.addEventListener("afterprint", end);
    return () => {
      window.removeEventListener("beforeprint", begin);
      window.removeEventListener("afterprint", end);
    };
  }, [getPicture]);
  if (!facts) return null;
  return createPortal(
    <div className="printed-sheet">
      <SheetPicture facts={facts} width="100%" height="100%" />
    </div>,
    document.body,
  );
}
