import { useEffect, useRef, useState } from "react";
import { onConnectionChange, subscribeToTopic } from "../shell/event-stream";

/** How long the sending waits for the ear to be there: progress is a comfort and must not keep anybody waiting. */
const PATIENCE_MS = 400;

/**
 * How far the reading of an uploaded file is, 0 … 1; undefined before the server tells. The second part begins to listen and
 * answers the name that must be sent with the file.
 */
export function useImportProgress(): [done: number | undefined, follow: () => Promise<string>] {
  const [done, setDone] = useState<number | undefined>(undefined);
  const leave = useRef<() => void>(undefined);
  useEffect(() => () => leave.current?.(), []);
  async function follow(): Promise<string> {
    leave.current?.();
    setDone(undefined);
    const name = [...crypto.getRandomValues(new Uint8Array(16))]
      .map((byte) => byte.toString(16).padStart(2, "0"))
      .join("");
    leave.current = subscribeToTopic(`import:${name}`, (data) => {
      if (typeof data === "object" && data !== null && "done" in data && typeof data.done === "number")
        setDone(data.done);
    });
    await new Promise<void>((resolve) => {
      const timer = setTimeout(finish, PATIENCE_MS);
      const end = onConnectionChange((state) => state === "open" && finish());
      function finish(): void {
        clearTimeout(timer);
        end();
        resolve();
      }
    });
    return name;
  }
  return [done, follow];
}
