import { Pause, Play, TriangleAlert } from "lucide-react";
import { useState } from "react";
import type { LiveTarget } from "~/domain/live/live-target";
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
export function LiveBar({ target, values }: { target: LiveTarget; values: LiveValues }) {
  const stream = useStream();
  const watched = useWatchedCount();
  const [isPaused, setPaused] = useState(false);
  const isOver = !target.isOpen && target.phase !== "starting";
  return (
    <header className="flex min-h-10 shrink-0 flex-wrap items-center gap-x-2.5 gap-y-1 border-b border-rule px-5 py-1 max-md:px-4">
      <b className="text-lead font-semibold tracking-[-0.01em]">{target.name}</b>
      <span className="font-mono text-note text-ink-3">{target.endpointUrl ?? "no endpoint"}</span>
      <span className="h-[18px] w-px bg-rule max-sm:hidden" />
      <StatusBadge status={isOver ? "bad" : stream === "running" ? "good" : "stale"} quiet>
        <span>
          {isOver ? `Test server ${target.phase}` : STREAM_WORDS[stream]}
          {stream === "running" && !isOver ? (
            <>
              , <span className="font-mono">{target.securityMode}</span>
            </>
          ) : null}
        </span>
      </StatusBadge>
      <span className="h-[18px] w-px bg-rule max-lg:hidden" />
      <span className="font-mono text-note text-ink-3 max-lg:hidden">{watched} nodes watched, published every 500 ms</span>
      <div className="ml-auto flex items-center gap-2.5">
        <span className="flex items-center gap-1.5 text-small text-warning">
          <Icon of={TriangleAlert} size={14} />
          {target.kind === "test-server" ? "Simulated values. No machine is connected." : "Reading from a live device. No values are written."}
        </span>
        {target.kind === "test-server" ? (
          <LinkButton to={`/models/${target.modelId}/test-server`}>Test server</LinkButton>
        ) : (
          <LinkButton to="/live/endpoints">Endpoints</LinkButton>
        )}
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
      {target.isProtected ? null : <p className="w-full text-small text-warning">Unprotected connection. Bench use only.</p>}
    </header>
  );
}
