import { useState } from "react";
import { useRevalidator } from "react-router";
import { showToast } from "~/components/ui/toast";
import type { SourceIntentJson } from "~/services/change-sources.server";

export type SourceActions = {
  readonly blockedBy: string | undefined;
  readonly isBusy: boolean;
  /** True when it was taken; a refusal is on screen then. */
  readonly send: (intent: SourceIntentJson) => Promise<boolean>;
};

/** Changes of sources, ports and gateways go to the server one by one; the page then shows what it keeps. */
export function useSourceActions(mayEdit: boolean): SourceActions {
  const { revalidate } = useRevalidator();
  const [isBusy, setBusy] = useState(false);
  async function send(intent: SourceIntentJson): Promise<boolean> {
    setBusy(true);
    try {
      const response = await fetch("/sources/changes", {
        method: "POST",
        headers: { "content-type": "application/json" },
        body: JSON.stringify(intent),
      });
      if (!response.ok) {
        const answer = (await response.json()) as { detail?: string; title?: string };
        showToast({
          tone: "error",
          title: "This cannot be saved",
          detail: answer.detail ?? answer.title ?? `status ${response.status}`,
          seconds: 12,
        });
        return false;
      }
      await revalidate();
      return true;
    } catch (error) {
      showToast({
        tone: "error",
        title: "The server did not answer",
        detail: error instanceof Error ? error.message : String(error),
      });
      return false;
    } finally {
      setBusy(false);
    }
  }
  return { blockedBy: mayEdit ? undefined : "asks for the role integrator, engineer or administrator", isBusy, send };
}
