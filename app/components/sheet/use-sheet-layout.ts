import { useCallback, useEffect, useRef, useState } from "react";
import { subscribeToTopic } from "../shell/event-stream";
import { EMPTY_LAYOUT, readLayout, type SheetLayout } from "./sheet-layout";

const SAVE_DELAY = 600;
const RETRY_DELAY = 3000;
/** Browsers let requests of this size outlive their page. */
const KEPT_ALIVE = 60_000;

export type SheetLayoutControl = {
  /** Undefined until it is loaded. */
  readonly layout: SheetLayout | undefined;
  readonly change: (make: (layout: SheetLayout) => SheetLayout) => void;
};

/**
 * Loads the layout of a sheet, saves it shortly after the last change, also when the page is left, and takes over what
 * another window saved. While the server is away it is kept and sent later.
 */
export function useSheetLayout(modelId: string, sheetId: string, mayEdit: boolean): SheetLayoutControl {
  const [layout, setLayout] = useState<SheetLayout>();
  const unsaved = useRef<SheetLayout>(undefined);
  const isSaving = useRef(false);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const url = `/models/${encodeURIComponent(modelId)}/sheets/${encodeURIComponent(sheetId)}`;

  const save = useCallback(async () => {
    clearTimeout(timer.current);
    const body = unsaved.current;
    if (!body || isSaving.current) return;
    unsaved.current = undefined;
    isSaving.current = true;
    const init = { method: "PUT", headers: { "content-type": "application/json" }, body: JSON.stringify(body) };
    const answer = await fetch(url, { ...init, keepalive: init.body.length < KEPT_ALIVE }).catch(() => undefined);
    isSaving.current = false;
    // A later change stands for the earlier one; without one this is tried again.
    if (!answer || answer.status >= 500) unsaved.current ??= body;
    if (unsaved.current) timer.current = setTimeout(() => void save(), answer ? SAVE_DELAY : RETRY_DELAY);
  }, [url]);

  useEffect(() => {
    const controller = new AbortController();
    const leave = (): void => void save();
    fetch(url, { signal: controller.signal })
      .then(async (answer) => setLayout(answer.ok ? readLayout(await answer.json()) : EMPTY_LAYOUT))
      .catch(() => {
        if (!controller.signal.aborted) setLayout(EMPTY_LAYOUT);
      });
    const endTopic = subscribeToTopic(`sheet:${modelId}`, (data) => {
      const { sheetId: saved, layout: theirs } = (data ?? {}) as { sheetId?: unknown; layout?: unknown };
      // One's own newer change wins over what comes back of an older one.
      if (saved === sheetId && theirs !== undefined && !unsaved.current && !isSaving.current) setLayout(readLayout(theirs));
    });
    window.addEventListener("pagehide", leave);
    return () => {
      controller.abort();
      endTopic();
      window.removeEventListener("pagehide", leave);
      leave();
    };
  }, [url, save, modelId, sheetId]);

  const change = useCallback(
    (make: (layout: SheetLayout) => SheetLayout) => {
      setLayout((old) => {
        const next = make(old ?? EMPTY_LAYOUT);
        if (mayEdit && next !== old) {
          unsaved.current = next;
          clearTimeout(timer.current);
          timer.current = setTimeout(() => void save(), SAVE_DELAY);
        }
        return next;
      });
    },
    [save, mayEdit],
  );

  return { layout, change };
}
