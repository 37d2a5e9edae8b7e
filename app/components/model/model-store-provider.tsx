import { useEffect, useMemo, useState, type ReactNode } from "react";
import type { ModelLayers, ModelWorkspace } from "~/presenters/model-workspace.server";
import { Button } from "../ui/button";
import { Notice } from "../ui/notice";
import { showToast } from "../ui/toast";
import { loadSpace } from "./load-space";
import { ModelKeys } from "./model-keys";
import { makeWaitingModel, openModel } from "./open-model";
import { prepareUnsaved } from "./unsaved-edits";
import { OpenModelContext, type OpenModel } from "./use-model";

/** Opens a model for the pages inside. The packs come after the first paint; until then the pages draw an empty model. */
export function ModelStoreProvider({ workspace, children }: { workspace: ModelWorkspace; children: ReactNode }) {
  const waiting = useMemo(() => makeWaitingModel(workspace), [workspace]);
  const [opened, setOpened] = useState<OpenModel>();
  const [failure, setFailure] = useState<string>();
  const [attempt, setAttempt] = useState(0);
  const [layers, setLayers] = useState<ModelLayers>();
  const current = useMemo(() => (layers ? { ...workspace, ...layers } : workspace), [workspace, layers]);

  useEffect(() => {
    const controller = new AbortController();
    let close: (() => void) | undefined;
    setFailure(undefined);
    const reload = async (author: string | undefined): Promise<void> => {
      const found = await fetch(`/models/${encodeURIComponent(current.model.id)}/layers`, { signal: controller.signal }).catch(() => undefined);
      if (!found?.ok) return;
      setLayers((await found.json()) as ModelLayers);
      showToast({ tone: "plain", title: `${author ?? "Somebody"} changed what this model stands on; it was loaded anew.`, seconds: 8 });
    };
    Promise.all([loadSpace(current, controller.signal), prepareUnsaved(current.model.id)])
      .then(([loaded, takeUnsaved]) => {
        if (controller.signal.aborted) return;
        const opening = openModel(current, { ...loaded, takeUnsaved }, waiting.view, (author) => void reload(author));
        close = opening.close;
        setOpened(opening.model);
      })
      .catch((error: unknown) => {
        if (!controller.signal.aborted) setFailure(error instanceof Error ? error.message : String(error));
      });
    return () => {
      controller.abort();
      close?.();
      setOpened(undefined);
    };
  }, [current, waiting, attempt]);

  return (
    <OpenModelContext value={opened ?? waiting}>
      {failure === undefined ? null : (
        <Notice tone="error" title="The model could not be loaded" live action={<Button onClick={() => setAttempt(attempt + 1)}>Load again</Button>}>
          {failure}
        </Notice>
      )}
      {opened ? <ModelKeys /> : null}
      {children}
    </OpenModelContext>
  );
}
