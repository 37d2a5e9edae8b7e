import { Pause, Play, TriangleAlert } from "lucide-react";
import { useState } from "react";
import type { TestServerState } from "~/domain/simulation/test-server-state";
import { StatusBadge } from "../notation/status-badge";
import { Button, LinkButton } from "../ui/button";
import { Icon } from "../ui/icon";
import { useStream, useWatchedCount } from "./live-context";
import type { LiveValues, StreamState } from "./live-values";

const STREAM_WORDS: Readonly<Record<StreamState, string>> = {
  running: "Session",
  stopped: "Stream stopped, trying again",
  lost: "Server not reached",
  paused: "Paused",
};

/** Which server, how it is reached, and that nothing here moves a machine. */
export function LiveBar({ server, values }: { server: TestServerState; values: LiveValues }) {
  const stream = useStream();
  const watched = useWatchedCount();
  const [isPaused, setPaused] = useState(false);
  const isOver = server.state !== "running" && server.state !== "starting";
  return (
    <header className="flex min-h-10 shrink-0 flex-wrap items-center gap-x-2.5 gap-y-1 border-b border-rule px-5 py-1 max-md:px-4">
      <b className="text-lead font-semibold tracking-[-0.01em]">{server.modelName}</b>
      <span className="font-mono text-note text-ink-3">{server.endpointUrl ?? "no endpoint"}</span>
      <span className="h-[18px] w-px bg-rule max-sm:hidden" />
      <StatusBadge status={isOver ? "bad" : stream === "running" ? "good" : "stale"} quiet>
        <span>
          {isOver ? `Test server ${server.state}` : STREAM_WORDS[stream]}
          {stream === "running" && !isOver ? (
            <>
              , <span className="font-mono">{server.security.includes("basic256sha256") ? "SignAndEncrypt" : "None"}</span>
            </>
          ) : null}
        </span>
      </StatusBadge>
      <span className="h-[18px] w-px bg-rule max-lg:hidden" />
      <span className="font-mono text-note text-ink-3 max-lg:hidden">{watched} nodes watched, published every 500 ms</span>
      <div className="ml-auto flex items-center gap-2.5">
        <span className="flex items-center gap-1.5 text-small text-warning">
          <Icon of={TriangleAlert} size={14} />
          Simulated values. No machine is connected.
        </span>
        <LinkButton to={`/models/${server.modelId}/test-server`}>Test server</LinkButton>
        <Button
          icon={isPaused ? Play : Pause}
          onClick={() => {
            values.setPaused(!isPaused);
            setPaused(!isPaused);
          }}
        >
          {isPaused ? "Go on" : "Pause"}
        </Button>
      </div>
      {server.security.includes("basic256sha256") ? null : <p className="w-full text-small text-warning">Unprotected connection. Bench use only.</p>}
    </header>
  );
}
