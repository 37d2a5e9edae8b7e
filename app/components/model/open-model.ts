/** Puts an open model together from its parts, and takes it apart again. Browser only. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { ModelEntry } from "~/domain/address-space/model-header";
import type { Transaction } from "~/domain/editing/operation";
import { EditorStore } from "~/editor/editor-store";
import type { ModelWorkspace } from "~/presenters/model-workspace.server";
import { onConnectionChange, subscribeToTopic } from "../shell/event-stream";
import { showToast } from "../ui/toast";
import { describe } from "./edit-steps";
import { FindingStore } from "./finding-store";
import { makeEmptySpace } from "./load-space";
import { ModelActions } from "./model-actions";
import { ModelTransport, parseTransaction } from "./model-transport";
import { PresenceStore } from "./presence-store";
import { followFindings } from "./run-checks";
import { followWaivers } from "./follow-waivers";
import { listRoots } from "./list-roots";
import { keepUnsaved, takeBlocks, type KeptEdits } from "./unsaved-edits";
import type { OpenModel } from "./use-model";
import { ViewStore } from "./view-store";

const NO_TRANSPORT = { post: async () => ({ kind: "unreachable" as const }), listSince: async () => undefined, lease: async () => undefined };

/** What the page is drawn with until the packs have come, on the server too: nothing in it, nothing to be changed. */
export function makeWaitingModel(workspace: ModelWorkspace): OpenModel {
  const space = makeEmptySpace(workspace.model.namespaceUri);
  const editor = new EditorStore({ space, seq: workspace.model.headSeq, clientId: "", canEdit: false, transport: NO_TRANSPORT, schedule: () => () => undefined });
  const view = new ViewStore();
  return { workspace, editor, view, findings: new FindingStore(), presence: new PresenceStore(), actions: new ModelActions(editor, view, false), isReady: false };
}

/** The model with its way to the server; the second function ends everything. */
export function openModel(
  workspace: ModelWorkspace,
  loaded: { space: AddressSpace; seq: number; takeUnsaved: () => KeptEdits | undefined },
  view: ViewStore,
  /** Called when the model stands on other required models now, with who changed them. */
  reload: (author: string | undefined) => void,
): { model: OpenModel; close: () => void } {
  const { id } = workspace.model;
  const canEdit = workspace.permissions.includes("model.edit");
  const unsaved = canEdit ? loaded.takeUnsaved() : undefined;
  // Taken from the tab in any case, so that no other copy of it holds them too.
  const blocks = canEdit ? takeBlocks(id) : [];
  const clientId = unsaved?.clientId ?? crypto.randomUUID();
  const transport = new ModelTransport(id, clientId);
  const editor: EditorStore = new EditorStore({
    space: loaded.space,
    seq: loaded.seq,
    clientId,
    canEdit,
    transport,
    schedule: (run, milliseconds) => {
      const timer = setTimeout(run, milliseconds);
      return () => clearTimeout(timer);
    },
    restored: unsaved ?? { pending: [], blocks, base: loaded.seq },
    onRefused: (refused) => {
      for (const { problems, conflictsWith } of refused) {
        const by = conflictsWith?.author ? `${conflictsWith.author} was quicker. ` : "";
        const reasons = describe(loaded.space, problems).join(" ");
        showToast({ tone: "warning", title: "One of your edits could not be kept", detail: `${by}${reasons} Your view shows the model as it is now; do the edit again if it is still right.`, seconds: 20 });
      }
    },
  });
  const findings = new FindingStore();
  const presence = new PresenceStore();
  const actions = new ModelActions(editor, view, canEdit);
  selectFirst(loaded.space, view);
  const model: OpenModel = { workspace, editor, view, findings, presence, actions, isReady: true };
  const ends = [
    followFindings(id, editor, findings),
    followWaivers(id, findings),
    followTransactions(id, editor, reload),
    presence.follow(id, transport, view),
    keepEdits(id, editor),
    () => editor.dispose(),
  ];
  return { model, close: () => ends.forEach((end) => end()) };
}

/** Something is always looked at: the first type, or the first machine. */
function selectFirst(space: AddressSpace, view: ViewStore): void {
  if (view.getState().selection.some((key) => space.getNode(key) !== undefined)) return;
  const [first] = listRoots(space);
  if (first !== undefined) view.select([first]);
}

/** Edits of others come by the stream; after it was away the store asks for what it missed. */
function followTransactions(modelId: string, editor: EditorStore, reload: (author: string | undefined) => void): () => void {
  let isOnOldLayers = false;
  const leaveLayers = (author: string | undefined): void => {
    // What follows is meant for other required models than those beneath; everything is loaded with them anew.
    isOnOldLayers = true;
    reload(author);
  };
  const hear = async (data: unknown): Promise<void> => {
    const transaction = await parseTransaction(data);
    if (!transaction || isOnOldLayers) return;
    if (changesLayers(editor, transaction)) leaveLayers(transaction.author);
    else editor.receive(transaction);
  };
  const endTopic = subscribeToTopic(`model:${modelId}`, (data) => {
    if (typeof data === "object" && data !== null && "pinned" in data) {
      if (!("by" in data && data.by === editor.clientId)) leaveLayers(undefined);
      else isOnOldLayers = true;
    } else if (typeof data === "object" && data !== null && "deleted" in data) showToast({ tone: "error", title: "This model was deleted." });
    else void hear(data);
  });
  const endWatch = onConnectionChange((state) => {
    if (state === "open" && !isOnOldLayers) void editor.catchUp();
  });
  return () => {
    endTopic();
    endWatch();
  };
}

/** Whether somebody else chose other required models; a new version of the model alone is an edit like any other. */
function changesLayers(editor: EditorStore, transaction: Transaction): boolean {
  if (transaction.clientId === editor.clientId) return false;
  const present = listRequiredUris(editor.getState().space.own.header.models);
  return transaction.operations.some(
    (operation) => operation.kind === "setHeader" && operation.field === "models" && listRequiredUris(operation.value as readonly ModelEntry[] | undefined) !== present,
  );
}

function listRequiredUris(models: readonly ModelEntry[] | undefined): string {
  return (models?.[0]?.requiredModels ?? []).map((required) => `${required.modelUri} ${required.version ?? ""}`).sort().join("\n");
}

/** Keeps what is not acknowledged for a reload, and asks before the tab is closed with it. */
function keepEdits(modelId: string, editor: EditorStore): () => void {
  const keep = (): void => keepUnsaved(modelId, { clientId: editor.clientId, ...editor.listUnsaved() });
  const ask = (event: BeforeUnloadEvent): void => {
    keep();
    if (editor.getState().pendingCount > 0) event.preventDefault();
  };
  window.addEventListener("pagehide", keep);
  window.addEventListener("beforeunload", ask);
  return () => {
    keep();
    window.removeEventListener("pagehide", keep);
    window.removeEventListener("beforeunload", ask);
  };
}
