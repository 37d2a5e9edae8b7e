import { Activity, RotateCw, Square, TriangleAlert } from "lucide-react";
import type { ReactNode } from "react";
import { useFetcher } from "react-router";
import { formatProblem } from "~/domain/core/problem-texts";
import { formatAge } from "~/domain/live/format-live";
import type { LogLine, TestServerState } from "~/domain/simulation/test-server-state";
import { StatusBadge, type Status } from "../notation/status-badge";
import { Button, LinkButton } from "../ui/button";
import { Icon } from "../ui/icon";
import { Notice } from "../ui/notice";
import { Table, TableScroll, Td, Th, Tr } from "../ui/table";
import { CopyField } from "./copy-field";
import { useNow } from "./live-context";
import { ServerLog } from "./server-log";
import { StageList } from "./stage-list";
import { useTestServer } from "./use-test-server";

type Props = { initial: TestServerState; initialLog: readonly LogLine[]; mayRun: boolean; headSeq: number };

const STATUS: Readonly<Record<TestServerState["state"], { status: Status; word: string }>> = {
  starting: { status: "stale", word: "Starting" },
  running: { status: "good", word: "Running" },
  stopping: { status: "stale", word: "Stopping" },
  stopped: { status: "stale", word: "Stopped" },
  failed: { status: "bad", word: "Failed" },
  lost: { status: "bad", word: "Lost" },
};

/** One test server: how far it is, how to reach it, who is connected, what it says, and its end. */
export function TestServerPanel({ initial, initialLog, mayRun, headSeq }: Props) {
  const { server, log } = useTestServer(initial, initialLog);
  const stop = useFetcher();
  const { status, word } = STATUS[server.state];
  const isStopping = stop.state !== "idle" || server.state === "stopping";
  const end = (): void => void stop.submit({ intent: "stop", id: server.id }, { method: "post" });
  const restart = (): void => void stop.submit({ intent: "restart", id: server.id }, { method: "post" });
  return (
    <article aria-label={server.applicationName} data-test-server={server.state} className="border-[1.5px] border-ink bg-leaf">
      <header className="flex min-h-10 flex-wrap items-center gap-x-3 gap-y-1 border-b border-ink px-4 py-1.5">
        <h2 className="text-head font-semibold">{server.applicationName}</h2>
        <StatusBadge status={status}>{isStopping ? "Stopping" : word}</StatusBadge>
        {server.state === "running" ? <Uptime since={server.runningAt} /> : null}
        <div className="ml-auto flex items-center gap-2">
          {server.state === "running" ? (
            <LinkButton tone="main" icon={Activity} to={`/live/${server.id}`}>
              Watch values
            </LinkButton>
          ) : null}
          {mayRun && server.state !== "starting" ? (
            <Button icon={Square} busy={isStopping} onClick={end}>
              {server.state === "failed" ? "Take off the list" : "Stop"}
            </Button>
          ) : null}
        </div>
      </header>
      <div className="grid gap-4 p-4">
        {server.state === "starting" ? <StageList server={server} onCancel={mayRun ? end : undefined} /> : null}
        {server.state === "failed" ? <Failure server={server} /> : null}
        {server.state === "running" && mayRun && server.servedSeq !== null && headSeq > server.servedSeq ? (
          <Notice
            tone="hint"
            title={`The model has changed since this server started: ${countEdits(headSeq - server.servedSeq)}`}
            action={
              <Button icon={RotateCw} busy={isStopping} onClick={restart}>
                Restart with them
              </Button>
            }
          >
            Connected clients lose their session; a new endpoint address follows.
          </Notice>
        ) : null}
        {server.state === "running" ? <Running server={server} /> : null}
        <details open={server.state === "failed"} className="text-small">
          <summary className="w-fit font-medium">Log, {log.length} lines</summary>
          <div className="mt-2">
            <ServerLog lines={log} />
          </div>
        </details>
      </div>
    </article>
  );
}

function countEdits(count: number): string {
  return count === 1 ? "1 edit" : `${count} edits`;
}

function Uptime({ since }: { since: string | null }) {
  const now = useNow(1000);
  return since !== null && now > 0 ? <span className="font-mono text-small text-ink-2">up {formatAge(now - Date.parse(since))}</span> : null;
}

function Failure({ server }: { server: TestServerState }) {
  return (
    <>
      <Notice tone="error" title="The test server does not run" live>
        {server.problems.map((problem, index) => (
          <p key={index} className="whitespace-pre-wrap">
            {formatProblem(problem)}
          </p>
        ))}
      </Notice>
      {server.stage === null ? null : <StageList server={server} />}
    </>
  );
}

function Running({ server }: { server: TestServerState }) {
  const isOpen = server.security.includes("none");
  return (
    <>
      <Notice tone="warning" glyph={<Icon of={TriangleAlert} size={14} />} title="Simulated values. No machine is connected.">
        Application name, address and a node at the top say so too. Not for control.
        {isOpen ? <p className="font-semibold">Unprotected connection. Bench use only.</p> : null}
      </Notice>
      <dl className="grid grid-cols-[112px_minmax(0,1fr)] gap-x-3 text-small leading-7 sm:grid-cols-[132px_minmax(0,1fr)]">
        <Row name="Endpoint">
          <CopyField label="endpoint" value={server.endpointUrl ?? ""} />
        </Row>
        <Row name="Security">
          {server.security.map((one) => (one === "none" ? "None" : "Basic256Sha256, Aes128_Sha256_RsaOaep or Aes256_Sha256_RsaPss, Sign and SignAndEncrypt")).join("; ")}
        </Row>
        <Row name="Sign in as">
          anonymous, or user <CopyField label="user name" value={server.tokens.userName} /> with password <CopyField label="password" value={server.tokens.password} />
        </Row>
        {server.certificateThumbprint ? (
          <Row name="Certificate">
            <CopyField label="thumbprint" value={server.certificateThumbprint} />
          </Row>
        ) : null}
        <Row name="Application URI">
          <span className="font-mono break-all">{server.applicationUri}</span>
        </Row>
        {server.feed ? (
          <Row name="Fed by sources">
            <span className="font-mono">{server.feed.inputs}</span> readings, <span className="font-mono">{server.feed.changes}</span> changes of Variables
            {server.feed.delay ? (
              <>
                ; from reading to Variable p99 <span className="font-mono">{server.feed.delay.p99.toFixed(1)} ms</span>
              </>
            ) : null}
          </Row>
        ) : null}
        <Row name="Values">
          {server.simulation?.moving ?? 0} move, {server.simulation?.fixed ?? 0} keep still; status{" "}
          <span className="font-mono">{server.simulatedQuality === "good" ? "Good" : "Uncertain_SimulatedValue"}</span>
        </Row>
        {server.load ? (
          <Row name="Load">
            <span className="font-mono">{server.load.memory} MB</span> of memory, <span className="font-mono">{(server.load.processor * 100).toFixed(0)} %</span> of one processor
          </Row>
        ) : null}
        {server.sampleInstances.length > 0 ? (
          <Row name="Instances">
            {server.sampleInstances.join(", ")}: made for this test server only, one of each type, because the model holds types alone
          </Row>
        ) : null}
      </dl>
      {server.problems.map((problem, index) => (
        <Notice key={index} tone="warning" title={formatProblem(problem)} />
      ))}
      <Sessions server={server} />
    </>
  );
}

function Row({ name, children }: { name: string; children: ReactNode }) {
  return (
    <>
      <dt className="border-b border-hair text-note leading-7 text-ink-3">{name}</dt>
      <dd className="min-w-0 border-b border-hair">{children}</dd>
    </>
  );
}

function Sessions({ server }: { server: TestServerState }) {
  const { sessions } = server;
  if (sessions.length === 0) return <p className="text-small text-ink-2">Nobody is connected.</p>;
  return (
    <TableScroll label="Sessions">
      <Table caption={`${sessions.length} ${sessions.length === 1 ? "session" : "sessions"}`}>
        <thead>
          <tr>
            <Th>Session</Th>
            <Th>User</Th>
            <Th>Security</Th>
            <Th>Since</Th>
            <Th right>Subscriptions</Th>
            <Th right>Watched</Th>
          </tr>
        </thead>
        <tbody>
          {sessions.map((session, index) => (
            <Tr key={index}>
              <Td>{session.name}</Td>
              <Td>{session.user}</Td>
              <Td mono>{session.security}</Td>
              <Td mono>{new Date(session.since).toLocaleTimeString("en-GB")}</Td>
              <Td right mono>
                {session.subscriptions}
              </Td>
              <Td right mono>
                {session.monitoredItems}
              </Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}
