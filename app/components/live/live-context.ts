import { createContext, useCallback, useContext, useEffect, useState, useSyncExternalStore } from "react";
import type { LiveValue, LiveValues, StreamState } from "./live-values";

export const LiveContext = createContext<LiveValues | undefined>(undefined);

export function useLiveValues(): LiveValues {
  const values = useContext(LiveContext);
  if (!values) throw new RangeError("A live piece stands outside of LiveContext");
  return values;
}

/** The newest value of a node; subscribes while the component is there. Null watches nothing. */
export function useLiveValue(nodeId: string | null): LiveValue | undefined {
  const values = useLiveValues();
  const subscribe = useCallback((listener: () => void) => (nodeId === null ? () => undefined : values.watch(nodeId, listener)), [values, nodeId]);
  const read = useCallback(() => (nodeId === null ? undefined : values.get(nodeId)), [values, nodeId]);
  return useSyncExternalStore(subscribe, read, () => undefined);
}

export function useStream(): StreamState {
  const values = useLiveValues();
  const subscribe = useCallback((listener: () => void) => values.onStream(listener), [values]);
  return useSyncExternalStore(subscribe, () => values.stream, () => "running");
}

export function useWatchedCount(): number {
  const values = useLiveValues();
  const subscribe = useCallback((listener: () => void) => values.onStream(listener), [values]);
  return useSyncExternalStore(subscribe, () => values.watchedCount, () => 0);
}

/** The time of this tab, a new one every `interval` ms; 0 before the page has come to life. */
export function useNow(interval: number): number {
  const [now, setNow] = useState(0);
  useEffect(() => {
    setNow(Date.now());
    const timer = setInterval(() => setNow(Date.now()), interval);
    return () => clearInterval(timer);
  }, [interval]);
  return now;
}
