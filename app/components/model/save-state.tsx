import { useEditorState } from "./use-model";

/** Whether the last edit has reached the server. */
export function SaveState() {
  const { sync, pendingCount, savedAt } = useEditorState();
  const edits = `${pendingCount} ${pendingCount === 1 ? "edit" : "edits"}`;
  const text =
    sync === "saving"
      ? "Saving …"
      : sync === "offline"
        ? `Offline, ${edits} waiting`
        : sync === "blocked"
          ? `Not saved: ${edits}. Sign in again`
          : savedAt === undefined
            ? "Saved"
            : `Saved ${formatTime(savedAt)}`;
  const tone = sync === "offline" || sync === "blocked" ? "text-warning font-medium" : "";
  return (
    <span role="status" className={tone}>
      {text}
    </span>
  );
}

function formatTime(iso: string): string {
  const date = new Date(iso);
  return `${String(date.getHours()).padStart(2, "0")}:${String(date.getMinutes()).padStart(2, "0")}`;
}
