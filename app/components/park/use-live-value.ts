import { useEffect, useState } from "react";
import { subscribeToTopic } from "~/components/shell/event-stream";
import type { Status } from "~/components/notation/status-badge";

export type LiveValue = { readonly text: string; readonly unit: string | undefined; readonly status: Status; readonly statusName: string };

/** The newest value of a Variable while a test server serves it; undefined before the first. */
export function useLiveValue(testServerId: string | undefined, nodeId: string | null): LiveValue | undefined {
  const [value, setValue] = useState<LiveValue | undefined>(undefined);
  useEffect(() => {
    setValue(undefined);
    if (testServerId === undefined || nodeId === null) return;
    return subscribeToTopic(`value:${testServerId}:${nodeId}`, (data) => setValue(toLiveValue(data)));
  }, [testServerId, nodeId]);
  return value;
}

type Message = { text?: unknown; unit?: unknown; status?: { name?: unknown; severity?: unknown } };

function toLiveValue(data: unknown): LiveValue | undefined {
  if (typeof data !== "object" || data === null) return undefined;
  const { text, unit, status } = data as Message;
  if (typeof text !== "string") return undefined;
  return {
    text,
    unit: typeof unit === "string" ? unit : undefined,
    status: toStatus(status?.severity),
    statusName: typeof status?.name === "string" ? status.name : "",
  };
}

function toStatus(severity: unknown): Status {
  const text = String(severity).toLowerCase();
  if (text === "good") return "good";
  return text === "uncertain" ? "uncertain" : "bad";
}
