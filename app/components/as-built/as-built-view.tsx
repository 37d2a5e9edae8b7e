import { ClipboardCheck } from "lucide-react";
import { Form, Link } from "react-router";
import type { AsBuiltVerdict } from "~/domain/as-built/as-built";
import type { AsBuiltPage } from "~/presenters/as-built-page.server";
import type { AsBuiltSummary } from "~/services/read-as-built.server";
import { StatusBadge } from "../notation/status-badge";
import { LocalTime } from "../shell/local-time";
import { Button, LinkButton } from "../ui/button";
import { Field, Input, Select, TextArea } from "../ui/field";
import { Notice } from "../ui/notice";
import { Block, Page } from "../ui/page";
import { Table, TableScroll, Td, Th, Tr } from "../ui/table";
import { PointChecks } from "./point-checks";
import { Schedules } from "./schedules";
import { RunProgress } from "./run-progress";

export type AsBuiltAnswer = { errors: readonly string[]; runId?: string; isRecorded?: true };

type Props = AsBuiltPage & { modelId: string; reports: readonly AsBuiltSummary[]; mayRecord: boolean; answer: AsBuiltAnswer | undefined };

/** Proof on the running thing: what a server serves against a frozen state, and signals proved by hand. */
export function AsBuiltView({ modelId, targets, revisions, deliveries, schedules, signals, pointChecks, reports, mayRecord, answer }: Props) {
  const blockedBy = mayRecord ? undefined : "asks for the role reviewer, integrator, engineer or administrator";
  return (
    <Page title="As-built" about="Whether a running server serves exactly what was frozen. Ferrule only reads; no values are written.">
      <div className="grid gap-8">
        {answer && answer.errors.length > 0 ? <Notice tone="error" live title={answer.errors.join(" ")} /> : null}
        {answer?.runId ? <RunProgress key={answer.runId} runId={answer.runId} /> : null}
        <Block title="A new report">
          {targets.length === 0 ? (
            <Notice tone="hint" title="No server can be read: start a test server, or name the gateway as an endpoint." action={<span className="flex gap-2"><LinkButton to={`/models/${modelId}/test-server`}>Test server</LinkButton><LinkButton to="/live/endpoints">Endpoints</LinkButton></span>} />
          ) : (
            <ReportForm targets={targets} revisions={revisions} deliveries={deliveries} blockedBy={blockedBy} />
          )}
        </Block>
        <Block title="Reports">
          {reports.length === 0 ? <p className="border-t border-ink py-2 text-small text-ink-2">No report yet.</p> : <ReportTable reports={reports} />}
        </Block>
        <Schedules schedules={schedules} endpoints={targets.filter((target) => !target.isTestServer)} blockedBy={blockedBy} />
        <PointChecks key={`${modelId} ${pointChecks.length}`} checks={pointChecks} signals={signals} targets={targets} blockedBy={blockedBy} />
      </div>
    </Page>
  );
}

function ReportForm({ targets, revisions, deliveries, blockedBy }: Pick<Props, "targets" | "revisions" | "deliveries"> & { blockedBy: string | undefined }) {
  return (
    <Form method="post" className="flex flex-wrap items-start gap-3 border-t border-ink pt-3">
      <input type="hidden" name="intent" value="report" />
      <Field label="Server" className="w-64">
        {(tied) => (
          <Select {...tied} name="targetId">
            {targets.map((target) => (
              <option key={target.id} value={target.id}>
                {target.name}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Field label="Compared with" className="w-72" {...(deliveries.length > 0 ? { hint: "As released, and with no point check outside, a delivery becomes proved." } : {})}>
        {(tied) => (
          <Select {...tied} name="state">
            {deliveries.map((delivery) => (
              <option key={delivery.id} value={`delivery ${delivery.id}`}>
                {delivery.text}
              </option>
            ))}
            {revisions.map((revision) => (
              <option key={revision.number} value={revision.number}>
                Revision {revision.number}: {revision.message.slice(0, 60)}
              </option>
            ))}
            <option value="working">the working state</option>
          </Select>
        )}
      </Field>
      <Field label="Watch the values for" className="w-36">
        {(tied) => <Input {...tied} name="watchSeconds" type="number" min={0} max={600} defaultValue={10} unit="s" mono />}
      </Field>
      <Field label="Does not count" optional hint="Paths or NodeIds, one a line; * for any characters." className="w-72">
        {(tied) => <TextArea {...tied} name="ignored" rows={2} mono placeholder="*/Vendor*" />}
      </Field>
      <label className="flex min-h-7 items-center gap-2 self-start pt-5 text-small">
        <input type="checkbox" name="texts" /> Names and descriptions count
      </label>
      <span className="ml-auto pt-5">
        <Button type="submit" tone="main" icon={ClipboardCheck} blockedBy={blockedBy}>
          Make a report
        </Button>
      </span>
    </Form>
  );
}

const VERDICTS = { "as released": "good", differs: "bad", "not shown": "uncertain" } as const;

export function VerdictBadge({ verdict }: { verdict: AsBuiltVerdict }) {
  return <StatusBadge status={VERDICTS[verdict]}>{verdict}</StatusBadge>;
}

function ReportTable({ reports }: Pick<Props, "reports">) {
  return (
    <TableScroll label="As-built reports">
      <Table caption="As-built reports, newest first">
        <thead>
          <tr>
            <Th right className="w-12">
              No.
            </Th>
            <Th>Verdict</Th>
            <Th>Server</Th>
            <Th>Compared with</Th>
            <Th right>Differences</Th>
            <Th right>Do not count</Th>
            <Th>SHA-256</Th>
            <Th>Made</Th>
          </tr>
        </thead>
        <tbody>
          {reports.map((report) => (
            <Tr key={report.id}>
              <Td right mono>
                <Link to={`/as-built/${report.id}`} className="text-copper underline-offset-2 hover:underline">
                  {report.number}
                </Link>
              </Td>
              <Td>
                <VerdictBadge verdict={report.verdict} />
              </Td>
              <Td>
                {report.target} <span className="font-mono text-note text-ink-3">{report.endpointUrl}</span>
              </Td>
              <Td>{report.revision === null ? "the working state" : `revision ${report.revision}`}</Td>
              <Td right mono>
                {report.counted}
              </Td>
              <Td right mono>
                {report.ignored}
              </Td>
              <Td mono className="text-ink-2" title={report.sha256}>
                {report.sha256.slice(0, 12)}…
              </Td>
              <Td className="text-ink-2">
                <LocalTime iso={report.at} />, {report.madeBy}
              </Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}
