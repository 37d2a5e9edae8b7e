/** Runs the checker in the browser after edits: the first time over the whole model, then only over what an edit touched. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { CheckRun } from "~/domain/checks/run-checks";
import type { EditorStore } from "~/editor/editor-store";
import type { FindingStore } from "./finding-store";

const FIRST_DELAY = 120;
const NEXT_DELAY = 250;

/** Follows the store until the answered function is called. */
export function followFindings(editor: EditorStore, findings: FindingStore): () => void {
  let run: CheckRun | undefined;
  let checked: AddressSpace | undefined;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let isEnded = false;

  async function check(): Promise<void> {
    timer = undefined;
    // The rules are many; they come after the first paint.
    const { startChecks, updateChecks } = await import("~/domain/checks/run-checks");
    const { space } = editor.getState();
    if (isEnded || space === checked) return;
    checked = space;
    run = run ? updateChecks(run, space) : startChecks(space);
    findings.set(space, run.findings);
  }

  function schedule(): void {
    if (editor.getState().space === checked) return;
    clearTimeout(timer);
    timer = setTimeout(() => void check(), run ? NEXT_DELAY : FIRST_DELAY);
  }

  schedule();
  const unsubscribe = editor.subscribe(schedule);
  return () => {
    isEnded = true;
    clearTimeout(timer);
    unsubscribe();
  };
}
