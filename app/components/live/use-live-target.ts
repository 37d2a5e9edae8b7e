import { useEffect, useState } from "react";
import { toLiveTarget, type LiveTarget } from "~/domain/live/live-target";
import type { TestServerState } from "~/domain/simulation/test-server-state";
import { subscribeToTopic } from "../shell/event-stream";

/** What Live looks at, as it is now: a test server tells when it stops; an endpoint only fails to answer. */
export function useLiveTarget(initial: LiveTarget): LiveTarget {
  const [target, setTarget] = useState(initial);
  useEffect(() => {
    setTarget(initial);
    if (initial.kind !== "test-server") return undefined;
    return subscribeToTopic(`test-server:${initial.id}`, (data) => {
      const { state } = data as { state?: TestServerState };
      if (state) setTarget(toLiveTarget(state));
    });
  }, [initial]);
  return target;
}
