/**
 * Findings of the open model. The first ones are the server's, so that a page opens without the rules, which are many, and
 * without checking a large model once more. The first edit brings the rules: the whole model is then checked in small steps
 * between which the page can paint, and after that only what an edit touched.
 */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Finding } from "~/domain/checks/finding";
import type { CheckRun } from "~/domain/checks/run-checks";
import type { EditorStore } from "~/editor/editor-store";
import type { FindingStore } from "./finding-store";

const FIRST_DELAY = 120;
const NEXT_DELAY = 250;
/** How long a step may keep the page from painting. */
const SLICE = 8;

/** Follows the store until the answered function is called. */
export function followFindings(modelId: string, editor: EditorStore, findings: FindingStore): () => void {
  const opened = editor.getState().space;
  const controller = new AbortController();
  let run: CheckRun | undefined;
  let checked: AddressSpace | undefined;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let isEnded = false;
  let isChecking = false;

  async function check(): Promise<void> {
    timer = undefined;
    if (isChecking) return;
    isChecking = true;
    const [{ startChecksInSteps, updateChecks }, { makeWiring }] = await Promise.all([
      import("~/domain/checks/run-checks"),
      import("~/domain/mapping/make-wiring"),
    ]);
    const { space } = editor.getState();
    if (!isEnded && space !== checked) {
      // The plan of the sources is the organisation's and not here: the server's findings tell of it.
      const wiring = makeWiring(space, []);
      const tell = (done: number) => findings.setProgress(done / Math.max(1, space.own.nodes.size));
      run = run
        ? updateChecks(run, space, wiring)
        : await finish(startChecksInSteps(space, { wiring }), tell, () => isEnded);
      checked = space;
      if (run && !isEnded) findings.set(space, run.findings);
    }
    isChecking = false;
    if (!isEnded) schedule();
  }

  function schedule(): void {
    if (editor.getState().space === checked) return;
    clearTimeout(timer);
    timer = setTimeout(() => void check(), run ? NEXT_DELAY : FIRST_DELAY);
  }

  void fetchFindings(modelId, controller.signal).then((answer) => {
    if (isEnded || checked !== undefined) return;
    const { space, seq } = editor.getState();
    // Somebody has edited meanwhile, or the server does not answer: the rules are needed at once.
    if (answer === undefined || answer.seq !== seq || space !== opened) return schedule();
    checked = space;
    findings.set(space, answer.findings);
  });
  const unsubscribe = editor.subscribe(() => {
    if (editor.getState().space !== opened) schedule();
  });
  return () => {
    isEnded = true;
    controller.abort();
    clearTimeout(timer);
    unsubscribe();
  };
}

async function fetchFindings(
  modelId: string,
  signal: AbortSignal,
): Promise<{ seq: number; findings: readonly Finding[] } | undefined> {
  const answer = await fetch(`/models/${encodeURIComponent(modelId)}/findings.json`, { signal }).catch(() => undefined);
  if (!answer?.ok) return undefined;
  return (await answer.json().catch(() => undefined)) as { seq: number; findings: readonly Finding[] } | undefined;
}

/** Runs the steps in slices and tells how many nodes are done; undefined when it was no longer wanted. */
async function finish(
  steps: Generator<number, CheckRun, undefined>,
  tell: (done: number) => void,
  isUnwanted: () => boolean,
): Promise<CheckRun | undefined> {
  let since = performance.now();
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
    if (performance.now() - since < SLICE) continue;
    tell(step.value);
    await new Promise((resolve) => setTimeout(resolve, 0));
    if (isUnwanted()) return undefined;
    since = performance.now();
  }
}
