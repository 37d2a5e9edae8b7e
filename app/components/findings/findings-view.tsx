import { ChevronDown, ChevronRight, Search } from "lucide-react";
import { useMemo, useState } from "react";
import { Link } from "react-router";
import type { WaivedFinding } from "~/components/model/finding-store";
import { findingWords, FindingShape } from "~/components/notation/finding-badge";
import { Button } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Input } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Progress } from "~/components/ui/progress";
import { Segments, ToggleSegments } from "~/components/ui/segments";
import { Tag } from "~/components/ui/tag";
import type { Finding } from "~/domain/checks/finding";
import { findRule, RULES } from "~/domain/checks/registry";
import type { Severity } from "~/domain/core/result";
import { FindingRow, type FindingTools } from "./finding-row";
import { MendPreview } from "./mend-preview";
import { WaivedList } from "./waived-list";
import { getFindingId, groupFindings, matchesText, type FindingGroup, type Grouping } from "./group-findings";

/** Rows of a group that are shown at first: one decision often settles the whole group. */
const firstRows = 8;

const severities: readonly Severity[] = ["error", "warning", "hint"];

type Props = {
  findings: readonly Finding[];
  waived: readonly WaivedFinding[];
  tools: FindingTools;
  ownNodes: number;
  /** How far a check of the whole model is, while one runs. */
  progress: number | undefined;
};

export function FindingsView({ findings, waived, tools, ownNodes, progress }: Props) {
  const [grouping, setGrouping] = useState<Grouping>("rule");
  const [shown, setShown] = useState<ReadonlySet<Severity>>(new Set(severities));
  const [text, setText] = useState("");
  const [opened, setOpened] = useState<string | undefined>(undefined);
  const [closed, setClosed] = useState<ReadonlySet<string>>(new Set());
  const visible = useMemo(
    () => findings.filter((f) => shown.has(f.severity) && matchesText(f, text)),
    [findings, shown, text],
  );
  const groups = useMemo(() => groupFindings(visible, grouping), [visible, grouping]);
  const first = groups[0]?.findings[0];
  const openId = opened ?? (first ? getFindingId(first) : undefined);

  return (
    <main id="main" tabIndex={-1} className="flex min-h-0 flex-1 flex-col outline-none">
      <h1 className="sr-only">Findings</h1>
      <div className="flex min-h-11 shrink-0 flex-wrap items-center gap-3 px-5 py-2">
        <Segments
          label="Group findings"
          value={grouping}
          onChange={setGrouping}
          options={[
            { value: "rule", label: "By rule" },
            { value: "place", label: "By place" },
          ]}
        />
        <ToggleSegments
          label="Severities shown"
          values={shown}
          onToggle={(severity) => setShown(toggled(shown, severity))}
          options={severities.map((severity) => {
            const words = findingWords(severity, findings.filter((f) => f.severity === severity).length);
            return {
              value: severity,
              name: words,
              label: (
                <>
                  <FindingShape severity={severity} /> {words}
                </>
              ),
            };
          })}
        />
        <label className="relative w-60">
          <span className="sr-only">Filter findings</span>
          <Icon of={Search} className="pointer-events-none absolute inset-y-0 left-2 my-auto text-ink-3" />
          <Input
            value={text}
            onChange={(event) => setText(event.currentTarget.value)}
            placeholder="Rule, name, clause"
            className="pl-7"
            type="search"
          />
        </label>
        {progress === undefined ? null : <Progress stage="Checking the whole model" done={progress} className="w-60" />}
        <p className="ml-auto text-note text-ink-3">
          <span className="font-mono">{ownNodes.toLocaleString("en").replaceAll(",", " ")}</span> nodes of the model
          checked by{" "}
          <Link to="/rules" className="border-b border-rule hover:border-copper hover:text-copper">
            <span className="font-mono">{RULES.length}</span> rules
          </Link>
          ; findings inside required models stay out
        </p>
      </div>
      <div className="min-h-0 flex-1 overflow-y-auto px-5 pb-8">
        {groups.length === 0 ? (
          <NothingFound total={findings.length} onShowAll={() => (setShown(new Set(severities)), setText(""))} />
        ) : (
          <ul className="border-t-[1.5px] border-ink">
            {groups.map((group) => (
              <Group
                key={group.id}
                group={group}
                grouping={grouping}
                tools={tools}
                openId={openId}
                onOpen={(id) => setOpened(id === openId ? "" : id)}
                isClosed={closed.has(group.id)}
                onToggle={() => setClosed(toggled(closed, group.id))}
              />
            ))}
          </ul>
        )}
        <WaivedList waived={waived} reopen={tools.reopen} />
      </div>
    </main>
  );
}

function toggled<T>(set: ReadonlySet<T>, value: T): ReadonlySet<T> {
  const next = new Set(set);
  if (!next.delete(value)) next.add(value);
  return next;
}

type GroupProps = {
  group: FindingGroup;
  grouping: Grouping;
  tools: FindingTools;
  openId: string | undefined;
  onOpen: (id: string) => void;
  isClosed: boolean;
  onToggle: () => void;
};

function Group({ group, grouping, tools, openId, onOpen, isClosed, onToggle }: GroupProps) {
  const fix = grouping === "rule" ? findRule(group.id)?.fix : undefined;
  const [showsAll, setShowsAll] = useState(false);
  const [isMending, setIsMending] = useState(false);
  const shown = showsAll ? group.findings : group.findings.slice(0, firstRows);
  return (
    <li className="border-b border-rule">
      <div className="flex h-8 items-center bg-bench pr-3">
        <button
          type="button"
          aria-expanded={!isClosed}
          onClick={onToggle}
          className="flex h-full min-w-0 flex-1 items-center gap-2 pl-1 text-left focus-visible:-outline-offset-2"
        >
          <Icon of={isClosed ? ChevronRight : ChevronDown} className="shrink-0 text-ink-3" />
          <FindingShape severity={group.severity} />
          {group.mark ? <span className="ml-1 w-10 font-mono text-small text-ink-2">{group.mark}</span> : null}
          <h2
            className={`truncate text-body font-semibold ${grouping === "place" && group.title.endsWith("Type") ? "italic" : ""}`}
          >
            {group.title}
          </h2>
          {group.clause ? <Tag>{group.clause}</Tag> : null}
        </button>
        <span className="flex items-center gap-3 text-note text-ink-3">
          {fix && tools.mend && group.findings.length > 1 ? (
            <Button size="small" aria-expanded={isMending} onClick={() => setIsMending(!isMending)} title={fix.label}>
              Mend all {group.findings.length}
            </Button>
          ) : null}
          {group.mark ? (
            <Link
              to={`/rules/${group.mark}`}
              className="border-b border-rule font-medium text-ink-2 hover:border-copper hover:text-copper"
              aria-label={`Help on ${group.mark}`}
            >
              Help
            </Link>
          ) : null}
          {group.severity}
          <span className="w-6 text-right font-mono text-small text-ink">{group.findings.length}</span>
        </span>
      </div>
      {isMending && fix ? (
        <MendAll label={fix.label} findings={group.findings} tools={tools} onDone={() => setIsMending(false)} />
      ) : null}
      {isClosed ? null : (
        <ul>
          {shown.map((finding) => {
            const id = getFindingId(finding);
            return (
              <FindingRow
                key={id}
                finding={finding}
                tools={tools}
                open={id === openId}
                onToggle={() => onOpen(id)}
                showsRule={grouping === "place"}
              />
            );
          })}
          {shown.length < group.findings.length ? (
            <li className="flex h-7 items-center pl-[74px]">
              <button
                type="button"
                onClick={() => setShowsAll(true)}
                className="border-b border-rule text-small font-medium hover:border-copper hover:text-copper"
              >
                Show {group.findings.length - shown.length} more
              </button>
            </li>
          ) : null}
        </ul>
      )}
    </li>
  );
}

type MendAllProps = { label: string; findings: readonly Finding[]; tools: FindingTools; onDone: () => void };

/** Before all findings of a kind are mended: what that changes, how many it is, and the way back. */
function MendAll({ label, findings, tools, onDone }: MendAllProps) {
  const mend = () => {
    tools.mend?.(findings);
    onDone();
  };
  return (
    <section
      aria-label={`Mend all: ${label}`}
      className="grid gap-3 border-b border-hair bg-leaf px-5 py-3"
      onKeyDown={(event) => {
        if (event.key === "Escape") onDone();
      }}
    >
      <h3 className="text-small font-semibold">{label}</h3>
      <div className="max-h-80 overflow-y-auto">
        <MendPreview space={tools.space} findings={findings} />
      </div>
      <p className="flex items-center gap-3">
        <Button tone="main" blockedBy={tools.mendBlockedBy} onClick={mend} autoFocus>
          Mend all {findings.length}
        </Button>
        <Button onClick={onDone}>Leave as it is</Button>
        <span className="text-note text-ink-3">undone with one step</span>
      </p>
    </section>
  );
}

function NothingFound({ total, onShowAll }: { total: number; onShowAll: () => void }) {
  if (total > 0)
    return (
      <Empty title="Nothing matches" action={<Button onClick={onShowAll}>Show all {total}</Button>}>
        The filter leaves none of the {total} findings.
      </Empty>
    );
  return (
    <Empty title="No findings" className="py-16">
      Every rule holds for every node of this model. Export it, or start a test server and look at it live.
    </Empty>
  );
}
