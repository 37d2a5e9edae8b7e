import { useCallback, useEffect, useRef, useState } from "react";
import { EMPTY_LAYOUT, readLayout, type SheetLayout } from "./sheet-layout";

const SAVE_DELAY = 600;

export type SheetLayoutControl = {
  /** Undefined until it is loaded. */
  readonly layout: SheetLayout | undefined;
  readonly change: (make: (layout: SheetLayout) => SheetLayout) => void;
};

/** Loads the layout of a sheet and saves it shortly after the last change, also when the page is left. */
export function useSheetLayout(modelId: string, sheetId: string, mayEdit: boolean): SheetLayoutControl {
  const [layout, setLayout] = useState<SheetLayout>();
  const unsaved = useRef<SheetLayout>(undefined);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const url = `/models/${encodeURIComponent(modelId)}/sheets/${encodeURIComponent(sheetId)}`;

  const save = useCallback(() => {
    clearTimeout(timer.current);
    const body = unsaved.current;
    if (!body) return;
    unsaved.current = undefined;
    void fetch(url, { method: "PUT", headers: { "content-type": "application/json" }, body: JSON.stringify(body), keepalive: true });
  }, [url]);

  useEffect(() => {
    const controller = new AbortController();
    fetch(url, { signal: controller.signal })
      .then(async (answer) => setLayout(answer.ok ? readLayout(await answer.json()) : EMPTY_LAYOUT))
      .catch(() => {
        if (!controller.signal.aborted) setLayout(EMPTY_LAYOUT);
      });
    window.addEventListener("pagehide", save);
    return () => {
      controller.abort();
      window.removeEventListener("pagehide", save);
      save();
    };
  }, [url, save]);

  const change = useCallback(
    (make: (layout: SheetLayout) => SheetLayout) => {
      setLayout((old) => {
        const next = make(old ?? EMPTY_LAYOUT);
        if (mayEdit && next !== old) {
          unsaved.current = next;
          clearTimeout(timer.current);
          timer.current = setTimeout(save, SAVE_DELAY);
        }
        return next;
      });
    },
    [save, mayEdit],
  );

  return { layout, change };
}
