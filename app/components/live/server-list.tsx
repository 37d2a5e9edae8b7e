import { Link } from "react-router";
import { formatAge } from "~/domain/live/format-live";
import type { TestServerState } from "~/domain/simulation/test-server-state";
import { StatusBadge } from "../notation/status-badge";
import { LinkButton } from "../ui/button";
import { Empty } from "../ui/empty";
import { Page } from "../ui/page";
import { useNow } from "./live-context";

type Props = { servers: readonly TestServerState[]; models: readonly { readonly id: string; readonly name: string }[] };

/** Where Live begins: the servers that can be looked at, or the way to one. */
export function ServerList({ servers, models }: Props) {
  const now = useNow(1000);
  return (
    <Page title="Live" about="Values of running servers, along the browse path.">
      {servers.length === 0 ? <NoServer models={models} /> : null}
      <ul className="grid max-w-240">
        {servers.map((server) => (
          <li key={server.id} className="flex min-h-12 flex-wrap items-center gap-x-4 gap-y-1 border-b border-hair py-2">
            <span className="w-56 min-w-0">
              <b className="block truncate font-semibold">{server.modelName}</b>
              <span className="font-mono text-note text-ink-3">{server.endpointUrl ?? "no endpoint yet"}</span>
            </span>
            <StatusBadge status={server.state === "running" ? "good" : server.state === "failed" ? "bad" : "stale"}>{server.state}</StatusBadge>
            <span className="font-mono text-small text-ink-2">{server.runningAt !== null && now > 0 ? `up ${formatAge(now - Date.parse(server.runningAt))}` : ""}</span>
            <span className="text-small text-ink-2">{server.sessions.length === 1 ? "1 session" : `${server.sessions.length} sessions`}</span>
            <span className="ml-auto flex gap-2">
              <LinkButton to={`/models/${server.modelId}/test-server`}>Test server</LinkButton>
              {server.state === "running" ? (
                <LinkButton tone="ink" to={`/live/${server.id}`}>
                  Watch values
                </LinkButton>
              ) : null}
            </span>
          </li>
        ))}
      </ul>
    </Page>
  );
}

function NoServer({ models }: { models: Props["models"] }) {
  return (
    <Empty title="No server runs" className="max-w-240">
      <p>Start a test server on a model; its values are then one press away.</p>
      <ul className="mt-3 grid gap-1">
        {models.map((model) => (
          <li key={model.id}>
            <Link to={`/models/${model.id}/test-server`} className="underline underline-offset-3 hover:text-copper">
              {model.name}
            </Link>
          </li>
        ))}
      </ul>
    </Empty>
  );
}
