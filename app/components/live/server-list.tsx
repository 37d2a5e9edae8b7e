import { Play } from "lucide-react";
import { Form, useNavigation } from "react-router";
import { formatAge } from "~/domain/live/format-live";
import type { LiveTarget } from "~/domain/live/live-target";
import type { TestServerState } from "~/domain/simulation/test-server-state";
import { StatusBadge } from "../notation/status-badge";
import { Button, LinkButton } from "../ui/button";
import { Empty } from "../ui/empty";
import { Page } from "../ui/page";
import { useNow } from "./live-context";

type Props = { servers: readonly TestServerState[]; endpoints: readonly LiveTarget[]; models: readonly { readonly id: string; readonly name: string }[]; mayRun: boolean };

/** Where Live begins: the servers that can be looked at, or the way to one. */
export function ServerList({ servers, endpoints, models, mayRun }: Props) {
  const now = useNow(1000);
  return (
    <Page title="Live" about="Values of running servers, along the browse path." actions={
        <>
          <LinkButton to="/boards">Watch boards</LinkButton>
          <LinkButton to="/live/endpoints">Endpoints</LinkButton>
        </>
      }
    >
      {servers.length === 0 && endpoints.length === 0 ? <NoServer models={models} mayRun={mayRun} /> : null}
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
        {endpoints.map((endpoint) => (
          <li key={endpoint.id} className="flex min-h-12 flex-wrap items-center gap-x-4 gap-y-1 border-b border-hair py-2">
            <span className="w-56 min-w-0">
              <b className="block truncate font-semibold">{endpoint.name}</b>
              <span className="font-mono text-note text-ink-3">{endpoint.endpointUrl}</span>
            </span>
            <span className="text-small text-ink-2">endpoint, {endpoint.isProtected ? endpoint.securityMode : "unprotected"}</span>
            <span className="ml-auto">
              <LinkButton tone="ink" to={`/live/${endpoint.id}`} aria-label={`Look at ${endpoint.name}`}>
                Look
              </LinkButton>
            </span>
          </li>
        ))}
      </ul>
    </Page>
  );
}

function NoServer({ models, mayRun }: Pick<Props, "models" | "mayRun">) {
  const navigation = useNavigation();
  return (
    <Empty title="No server runs" className="max-w-240">
      {models.length === 0 ? (
        <p>Make a model first; a test server then serves it with simulated values.</p>
      ) : (
        <p>Start a test server on a model; its values are then one press away.</p>
      )}
      <ul className="mt-3 grid justify-items-center gap-2">
        {models.map((model, index) => {
          const action = `/models/${model.id}/test-server`;
          return (
            <li key={model.id}>
              <Form method="post" action={action}>
                <input type="hidden" name="intent" value="start" />
                <Button
                  type="submit"
                  tone={index === 0 ? "main" : "plain"}
                  icon={Play}
                  busy={navigation.formAction === action}
                  blockedBy={mayRun ? undefined : "Your roles do not start test servers"}
                >
                  Start test server on {model.name}
                </Button>
              </Form>
            </li>
          );
        })}
      </ul>
    </Empty>
  );
}
