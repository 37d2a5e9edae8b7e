import { useEffect, useState } from "react";
import type { LogLine, TestServerState } from "~/domain/simulation/test-server-state";
import { subscribeToTopic } from "../shell/event-stream";

type News = { readonly state?: TestServerState; readonly log?: readonly LogLine[]; readonly removed?: boolean };

const LOG_LIMIT = 400;

/** A test server as it is now: what the page came with, kept fresh by the event stream. */
export function useTestServer(initial: TestServerState, initialLog: readonly LogLine[] = []): { server: TestServerState; log: readonly LogLine[]; isRemoved: boolean } {
  const [server, setServer] = useState(initial);
  const [log, setLog] = useState(initialLog);
  const [isRemoved, setRemoved] = useState(false);
  useEffect(() => {
    setServer(initial);
    setRemoved(false);
  }, [initial]);
  useEffect(() => setLog(initialLog), [initialLog]);
  useEffect(
    () =>
      subscribeToTopic(`test-server:${initial.id}`, (data) => {
        const news = data as News;
        if (news.state) setServer(news.state);
        if (news.removed) setRemoved(true);
        if (news.log) setLog((known) => [...known, ...(news.log ?? [])].slice(-LOG_LIMIT));
      }),
    [initial.id],
  );
  return { server, log, isRemoved };
}
