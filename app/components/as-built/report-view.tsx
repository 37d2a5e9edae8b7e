import { Download, Printer } from "lucide-react";
import type { ReactNode } from "react";
import type { AsBuiltDifference, Observation } from "~/domain/as-built/as-built";
import { groupDifferences, type AsBuiltReport } from "~/domain/as-built/as-built-report";
import type { AsBuiltSummary } from "~/services/read-as-built.server";
import { formatCount } from "~/utils/format";
import { LocalTime } from "../shell/local-time";
import { Button, LinkButton } from "../ui/button";
import { Notice } from "../ui/notice";
import { Block, Page } from "../ui/page";
import { Table, TableScroll, Td, Th, Tr } from "../ui/table";
import { VerdictBadge } from "./as-built-view";

type Props = { summary: AsBuiltSummary; body: AsBuiltReport; modelId: string };

/** One as-built report with its evidence; it prints on paper as it stands. */
export function ReportView({ summary, body, modelId }: Props) {
  const groups = groupDifferences(body.differences);
  return (
    <Page
      title={`As-built report ${summary.number}`}
      about={<VerdictBadge verdict={body.verdict} />}
      actions={
        <span className="flex gap-2 print:hidden">
          <LinkButton to={`/models/${modelId}/as-built`}>All reports</LinkButton>
          <LinkButton to={`/api/v1/as-built-reports/${summary.id}`} icon={Download} reloadDocument download={`as-built-${summary.number}.json`}>
            Evidence, JSON
          </LinkButton>
          <Button icon={Printer} onClick={() => print()}>
            Print
          </Button>
        </span>
      }
    >
      <Facts summary={summary} body={body} />
      {body.remarks.map((remark) => (
        <Notice key={remark} tone="warning" title={remark} className="mb-3" />
      ))}
      {groups.length === 0 ? <p className="mb-8 border-t border-ink py-2 text-small">Nothing differs: every node, reference and value that was compared is as in the model.</p> : null}
      {groups.map(({ aspect, list }) => (
        <Block key={aspect} title={aspect.charAt(0).toUpperCase() + aspect.slice(1)} about={<span className="font-mono">{list.length}</span>} className="mb-6">
          <DifferenceTable caption={aspect} list={list} />
        </Block>
      ))}
      {body.observations.length > 0 ? (
        <Block title="Values that were not good all the time" className="mb-6">
          <ObservationTable list={body.observations} />
        </Block>
      ) : null}
    </Page>
  );
}

function Facts({ summary, body }: Pick<Props, "summary" | "body">) {
  const checks = body.pointChecks;
  const outside = checks.filter((check) => !check.isWithin).length;
  const rows: [string, ReactNode][] = [
    ["Model", `${body.model.name}, ${body.model.revision === null ? "working state" : `revision ${body.model.revision}`}${body.model.version ? `, version ${body.model.version}` : ""}`],
    ...(body.delivery ? [["Delivery", `version ${body.delivery.version} to ${body.delivery.gateway}`] as [string, ReactNode]] : []),
    ["Server", `${body.target.name}, ${body.target.endpointUrl}, ${body.target.securityMode}`],
    ["Made", <><LocalTime key="t" iso={body.startedAt} />, {body.madeBy}</>],
    ["Compared", `${formatCount(body.counts.nodes)} nodes of the model with ${formatCount(body.counts.servedNodes)} of the server`],
    ["Watched", body.watchedFor > 0 ? `${formatCount(body.counts.watched)} Variables for ${body.watchedFor / 1000} s` : "not watched"],
    ["Differences", `${formatCount(body.counts.counted)} count, ${formatCount(body.counts.ignored)} do not`],
    ["Does not count", body.tolerance.ignored.length > 0 ? body.tolerance.ignored.join(", ") : "nothing was left out"],
    ["Point checks", checks.length === 0 ? "none" : `${formatCount(checks.length)}, ${outside === 0 ? "all within their tolerance" : `${outside} outside their tolerance`}`],
    ["SHA-256", <span key="h" className="font-mono text-note break-all">{summary.sha256}</span>],
    ["Signature", <span key="s" className="font-mono text-note break-all">{summary.signature ?? "not signed"}</span>],
  ];
  return (
    <dl className="mb-6 grid max-w-240 grid-cols-[120px_1fr] gap-x-4 gap-y-1 border-t border-ink pt-2 text-small">
      {rows.map(([name, value]) => (
        <div key={name} className="contents">
          <dt className="text-ink-3">{name}</dt>
          <dd>{value}</dd>
        </div>
      ))}
    </dl>
  );
}

function DifferenceTable({ caption, list }: { caption: string; list: readonly AsBuiltDifference[] }) {
  return (
    <TableScroll label={caption}>
      <Table caption={caption}>
        <thead>
          <tr>
            <Th>Place</Th>
            <Th>What</Th>
            <Th>As released</Th>
            <Th>Found</Th>
          </tr>
        </thead>
        <tbody>
          {list.map((difference, index) => (
            <Tr key={index} className={difference.ignoredBy === undefined ? undefined : "text-ink-3"}>
              <Td mono title={difference.nodeId}>
                {difference.path}
              </Td>
              <Td>
                {difference.kind.replaceAll("-", " ")}
                {difference.detail ? `, ${difference.detail}` : ""}
                {difference.ignoredBy === undefined ? "" : ` (does not count: ${difference.ignoredBy})`}
              </Td>
              <Td mono>{difference.released ?? "–"}</Td>
              <Td mono>{difference.found ?? "–"}</Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}

function ObservationTable({ list }: { list: readonly Observation[] }) {
  return (
    <TableScroll label="Values that were not good all the time">
      <Table caption="Values that were not good all the time">
        <thead>
          <tr>
            <Th>Variable</Th>
            <Th>Worst status</Th>
            <Th right>Samples</Th>
            <Th right>Bad for</Th>
            <Th right>Uncertain for</Th>
          </tr>
        </thead>
        <tbody>
          {list.map((seen) => (
            <Tr key={seen.nodeId}>
              <Td mono title={seen.nodeId}>
                {seen.path}
              </Td>
              <Td mono>{seen.samples === 0 ? "no value came" : seen.worstStatus}</Td>
              <Td right mono>
                {seen.samples}
              </Td>
              <Td right mono>
                {(seen.badFor / 1000).toFixed(1)} s
              </Td>
              <Td right mono>
                {(seen.uncertainFor / 1000).toFixed(1)} s
              </Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}
