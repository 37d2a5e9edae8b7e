import { useEffect, useState } from "react";
import { subscribeToTopic } from "~/components/shell/event-stream";
import type { Sample } from "~/domain/live/sample";

/** The newest sample of a Variable while a test server serves it; undefined before the first. */
export function useLiveValue(testServerId: string | undefined, nodeId: string | null): Sample | undefined {
  const [sample, setSample] = useState<Sample | undefined>(undefined);
  useEffect(() => {
    setSample(undefined);
    if (testServerId === undefined || nodeId === null) return;
    return subscribeToTopic(`value:${testServerId}:${nodeId}`, (data) => setSample(data as Sample));
  }, [testServerId, nodeId]);
  return sample;
}
