import { useCallback, useEffect, useMemo, useState } from "react";
import type { SheetSummary } from "~/presenters/sheets.server";
import { onConnectionChange, subscribeToTopic } from "../shell/event-stream";
import { showToast } from "../ui/toast";
import type { SheetLayout } from "./sheet-layout";

export type SheetsControl = {
  readonly sheets: readonly SheetSummary[];
  /** Answers the id of the new sheet, undefined when it could not be made. */
  readonly add: (name: string, layout?: SheetLayout) => Promise<string | undefined>;
  readonly rename: (id: string, name: string) => void;
  readonly move: (id: string, place: number) => void;
  readonly remove: (id: string) => Promise<boolean>;
};

/** The sheets of a model in their order, also when somebody else makes, renames, moves or removes one. */
export function useSheets(modelId: string, initial: readonly SheetSummary[]): SheetsControl {
  const [sheets, setSheets] = useState(initial);
  const base = `/models/${encodeURIComponent(modelId)}/sheets`;

  const load = useCallback(async () => {
    const answer = await fetch(base).catch(() => undefined);
    if (answer?.ok) setSheets((await answer.json()) as SheetSummary[]);
  }, [base]);

  useEffect(() => {
    void load();
    const endTopic = subscribeToTopic(`sheet:${modelId}`, (data) => {
      // A message with a layout says where cards lie; all others change the list.
      if (typeof data === "object" && data !== null && !("layout" in data)) void load();
    });
    const endWatch = onConnectionChange((state) => {
      if (state === "open") void load();
    });
    return () => {
      endTopic();
      endWatch();
    };
  }, [modelId, load]);

  return useMemo(() => {
    const send = async (path: string, method: string, body?: unknown): Promise<Response | undefined> => {
      const init = body === undefined ? { method } : { method, headers: { "content-type": "application/json" }, body: JSON.stringify(body) };
      const answer = await fetch(path, init).catch(() => undefined);
      if (!answer?.ok) {
        const told = (await answer?.json().catch(() => undefined)) as { detail?: string } | undefined;
        showToast({ tone: "error", title: told?.detail ?? "The sheets cannot be changed while the server is away.", seconds: 8 });
        return undefined;
      }
      void load();
      return answer;
    };
    const pathOf = (id: string) => `${base}/${encodeURIComponent(id)}`;
    return {
      sheets,
      add: async (name, layout) => {
        const answer = await send(base, "POST", layout ? { name, layout } : { name });
        const made = answer && ((await answer.json()) as SheetSummary);
        if (made) setSheets((old) => (old.some((sheet) => sheet.id === made.id) ? old : [...old, made]));
        return made?.id;
      },
      rename: (id, name) => {
        setSheets((old) => old.map((sheet) => (sheet.id === id ? { ...sheet, name } : sheet)));
        void send(pathOf(id), "PATCH", { name });
      },
      move: (id, place) => void send(pathOf(id), "PATCH", { place }),
      remove: async (id) => (await send(pathOf(id), "DELETE")) !== undefined,
    };
  }, [sheets, base, load]);
}
