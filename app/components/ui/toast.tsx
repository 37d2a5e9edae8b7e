import { X } from "lucide-react";
import { useEffect, useSyncExternalStore, type ReactNode } from "react";
import { IconButton } from "./button";
import { Notice, type NoticeTone } from "./notice";

export type Toast = {
  id: number;
  tone: NoticeTone;
  title: string;
  detail?: ReactNode;
  action?: ReactNode;
  seconds?: number;
};

let toasts: readonly Toast[] = [];
let nextId = 1;
const listeners = new Set<() => void>();
const none: readonly Toast[] = [];

function change(next: readonly Toast[]) {
  toasts = next;
  for (const listener of listeners) listener();
}

/** Shows a passing word at the lower edge; errors stay until closed. Answers a function that takes it away. */
export function showToast(toast: Omit<Toast, "id">): () => void {
  const id = nextId++;
  change([...toasts.slice(-3), { ...toast, id }]);
  return () => change(toasts.filter((t) => t.id !== id));
}

function subscribe(listener: () => void) {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

function ToastRow({ toast }: { toast: Toast }) {
  const close = () => change(toasts.filter((t) => t.id !== toast.id));
  const seconds = toast.seconds ?? (toast.tone === "error" ? undefined : 6);
  useEffect(() => {
    if (seconds === undefined) return;
    const timer = setTimeout(() => change(toasts.filter((t) => t.id !== toast.id)), seconds * 1000);
    return () => clearTimeout(timer);
  }, [toast.id, seconds]);
  return (
    <Notice
      tone={toast.tone}
      title={toast.title}
      live
      className="w-88 max-w-[calc(100vw-32px)]"
      action={
        <span className="flex items-center gap-1">
          {toast.action}
          <IconButton icon={X} label="Close message" size="small" onClick={close} />
        </span>
      }
    >
      {toast.detail}
    </Notice>
  );
}

/** Once, in the page frame. */
export function Toaster() {
  const shown = useSyncExternalStore(
    subscribe,
    () => toasts,
    () => none,
  );
  return (
    <div className="pointer-events-none fixed right-4 bottom-16 z-50 grid gap-2 *:pointer-events-auto">
      {shown.map((toast) => (
        <ToastRow key={toast.id} toast={toast} />
      ))}
    </div>
  );
}
