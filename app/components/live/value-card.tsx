import { Eye, EyeOff } from "lucide-react";
import { Fragment, type ReactNode } from "react";
import { makeCodeLines } from "~/domain/live/code-lines";
import type { BrowsedNode, NodeCard } from "~/domain/live/live-node";
import { formatAge } from "~/domain/live/format-live";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { StatusBadge } from "../notation/status-badge";
import { Button } from "../ui/button";
import { cx } from "../ui/cx";
import { CopyField } from "./copy-field";
import { getAge } from "./live-values";
import { useLiveValue, useNow, useStream } from "./live-context";
import { RangeScale } from "./range-scale";
import { nameStatus, showValue, toStatus } from "./show-value";
import type { CardState } from "./use-node-card";

type Props = {
  node: BrowsedNode | undefined;
  path: readonly BrowsedNode[];
  state: CardState;
  isWatched: boolean;
  onWatch: () => void;
  onOpenMember: (node: BrowsedNode) => void;
  /** Writing or calling, where the node allows it. */
  act: ReactNode;
};

export function ValueCard({ node, path, state, isWatched, onWatch, onOpenMember, act }: Props) {
  if (!node) {
    return (
      <section aria-label="Value" className="grid min-w-0 flex-1 content-start gap-1 bg-leaf p-6 text-small text-ink-2 max-md:border-t max-md:border-rule">
        <p className="text-body font-semibold text-ink">Choose a node</p>
        <p>The columns open to the right along the browse path; what they end at is shown here with its value, unit, status and age.</p>
        <p className="text-ink-3">Arrow keys move in and between columns, letters jump to a name, W puts a Variable on the watch strip.</p>
      </section>
    );
  }
  const { card, members, problem } = state;
  return (
    <section aria-label="Value" className="min-w-0 flex-1 overflow-y-auto bg-leaf px-7 pt-3.5 pb-4 *:max-w-150 max-md:border-t max-md:border-rule max-md:px-4">
      <header className="flex items-center gap-2.5">
        <span data-wire-end className="flex h-7 items-center">
          <NodeClassGlyph kind={node.isProperty ? "Property" : node.nodeClass} label />
        </span>
        <h2 className="min-w-0 flex-1 truncate text-lead font-semibold tracking-[-0.01em]">{node.displayName}</h2>
        {node.nodeClass === "Variable" ? (
          <Button icon={isWatched ? EyeOff : Eye} onClick={onWatch} aria-pressed={isWatched} aria-keyshortcuts="w">
            {isWatched ? "Off the watch strip" : "On the watch strip"}
          </Button>
        ) : null}
      </header>
      <p className="mt-1 truncate pl-7.5 font-mono text-note text-ink-3" title={toPathText(path)}>
        {toPathText(path)}
      </p>
      {problem ? <p className="mt-3 text-small text-error">{problem}</p> : null}
      {node.nodeClass === "Variable" ? <LiveFigure node={node} card={card} /> : null}
      {card ? <Facts node={node} card={card} /> : null}
      {card && card.states.length > 0 ? <States node={node} card={card} /> : null}
      {act}
      {card ? <TakeAway card={card} path={path} /> : null}
      {card?.description ? <p className="mt-3 text-small text-ink-2">{card.description}</p> : null}
      {members.length > 0 ? <Members members={members} onOpen={onOpenMember} /> : null}
    </section>
  );
}

function toPathText(path: readonly BrowsedNode[]): string {
  return `/${path.map((step) => step.displayName).join("/")}`;
}

function LiveFigure({ node, card }: { node: BrowsedNode; card: NodeCard | null }) {
  const value = useLiveValue(node.nodeId);
  const stream = useStream();
  const now = useNow(200);
  const range = card?.range ?? node.range;
  const unit = card?.unit?.text ?? node.unit?.text ?? "";
  if (!value) return <p className="mt-3 text-small text-ink-3">Waiting for the first value…</p>;
  const { sample } = value;
  const isStale = stream !== "running";
  const isScalar = typeof sample.value !== "object" || sample.value === null;
  return (
    <>
      <div className="mt-2.5 flex flex-wrap items-end justify-between gap-x-4">
        {isScalar ? (
          <p data-live-value className={cx("min-w-0 truncate font-mono text-live font-medium tracking-[-0.03em]", isStale && "text-stale")}>
            {showValue(sample, range)}
            {unit && sample.value !== null ? <span className="ml-1.5 text-[16px] tracking-normal text-ink-2">{unit}</span> : null}
          </p>
        ) : (
          <pre data-live-value className={cx("max-h-40 min-w-0 flex-1 overflow-auto font-mono text-small", isStale && "text-stale")}>{JSON.stringify(sample.value, null, 1)}</pre>
        )}
        <div className="grid shrink-0 justify-items-end gap-px pb-1 text-right max-md:w-full max-md:grid-cols-[auto_1fr] max-md:justify-items-start max-md:gap-3">
          <StatusBadge status={toStatus(sample, stream)}>
            <span className="font-mono">{nameStatus(sample, stream)}</span>
          </StatusBadge>
          <span className="font-mono text-small text-ink-2">{now > 0 ? `${formatAge(getAge(value, now))} old` : ""}</span>
        </div>
      </div>
      {range ? <RangeScale range={range} unit={unit} value={typeof sample.value === "number" ? sample.value : null} isStale={isStale} /> : null}
    </>
  );
}

function Facts({ node, card }: { node: BrowsedNode; card: NodeCard }) {
  const value = useLiveValue(node.nodeClass === "Variable" ? node.nodeId : null);
  const { sample } = value ?? card;
  const isVariable = card.nodeClass === "Variable";
  return (
    <dl className="mt-2.5 grid grid-cols-2 gap-x-5 border-t border-hair text-small max-lg:grid-cols-1">
      <Fact name="NodeId" wide title={card.nodeId}>
        {card.nodeId}
      </Fact>
      {card.dataType ? <Fact name="DataType">{toDataType(card)}</Fact> : <Fact name="NodeClass">{card.nodeClass}</Fact>}
      {card.typeName ? (
        <Fact name="Type" words>
          <i>{card.typeName}</i>
        </Fact>
      ) : null}
      {isVariable ? <Fact name="Source time">{toTime(sample?.sourceTimestamp)}</Fact> : null}
      {isVariable ? <Fact name="Server time">{toTime(sample?.serverTimestamp)}</Fact> : null}
      {isVariable ? <Fact name="Access">{card.accessLevel.join(", ") || "none"}</Fact> : null}
      {isVariable && sample ? <Fact name="Status code">{`0x${sample.status.code.toString(16).toUpperCase().padStart(8, "0")}`}</Fact> : null}
      {card.unit?.description ? (
        <Fact name="Unit" words>
          {card.unit.description}
        </Fact>
      ) : null}
      {card.executable === null ? null : <Fact name="Executable">{card.executable ? "true" : "false"}</Fact>}
    </dl>
  );
}

/** What one takes from here into a program or a mail. */
function TakeAway({ card, path }: { card: NodeCard; path: readonly BrowsedNode[] }) {
  const lines = card.nodeClass === "Variable" ? makeCodeLines(card.nodeId) : [];
  return (
    <details className="mt-3 text-small">
      <summary className="w-fit text-ink-2">Copy NodeId, path or code</summary>
      <dl className="mt-1 grid grid-cols-[82px_minmax(0,1fr)] text-note leading-6">
        <dt className="text-ink-3">NodeId</dt>
        <dd>
          <CopyField label="NodeId" value={card.nodeId} />
        </dd>
        <dt className="text-ink-3">Path</dt>
        <dd>
          <CopyField label="path" value={toPathText(path)} />
        </dd>
        {lines.map(({ language, text }) => (
          <Fragment key={language}>
            <dt className="text-ink-3">{language}</dt>
            <dd>
              <CopyField label={`${language} line`} value={text} />
            </dd>
          </Fragment>
        ))}
      </dl>
    </details>
  );
}

function Fact({ name, wide, words, title, children }: { name: string; wide?: boolean; words?: boolean; title?: string; children: ReactNode }) {
  return (
    <div className={cx("grid grid-cols-[82px_minmax(0,1fr)] border-b border-hair leading-[23px]", wide && "col-span-full")}>
      <dt className="text-note leading-[23px] text-ink-3">{name}</dt>
      <dd className={cx("truncate", !words && "font-mono")} title={title}>
        {children}
      </dd>
    </div>
  );
}

function toDataType(card: NodeCard): string {
  const rank = card.valueRank ?? -1;
  return `${card.dataType?.name ?? ""}${rank > 0 ? `[${card.arrayDimensions.join(",") || ",".repeat(rank - 1)}]` : ""}`;
}

/** Time of day with milliseconds, as the clock of this host shows it. */
function toTime(stamp: string | null | undefined): string {
  if (!stamp) return "not given";
  const date = new Date(stamp);
  return `${date.toLocaleTimeString("en-GB")}.${String(date.getMilliseconds()).padStart(3, "0")}`;
}

function States({ node, card }: { node: BrowsedNode; card: NodeCard }) {
  const current = useLiveValue(node.nodeId)?.sample.value;
  return (
    <ul aria-label="States" className="mt-3 flex flex-wrap gap-1">
      {card.states.map((state) => (
        <li
          key={state.value}
          aria-current={state.value === current || undefined}
          className={cx("flex h-6 items-center gap-1.5 border px-2 text-small", state.value === current ? "border-ink bg-ink text-ink-on" : "border-rule text-ink-2")}
        >
          <span className="font-mono text-note">{state.value}</span>
          {state.text}
        </li>
      ))}
    </ul>
  );
}

function Members({ members, onOpen }: { members: readonly BrowsedNode[]; onOpen: (node: BrowsedNode) => void }) {
  return (
    <div className="mt-3">
      <h3 className="border-b border-ink pb-0.5 text-note font-medium text-ink-3">Members</h3>
      <ul>
        {members.map((member) => (
          <li key={member.nodeId} className="border-b border-hair">
            <button type="button" onClick={() => onOpen(member)} className="flex h-6 w-full min-w-0 items-center gap-2 text-left text-small hover:bg-bench">
              <NodeClassGlyph kind={member.isProperty ? "Property" : member.nodeClass} />
              <span className="shrink-0">{member.displayName}</span>
              <MemberValue member={member} />
            </button>
          </li>
        ))}
      </ul>
    </div>
  );
}

function MemberValue({ member }: { member: BrowsedNode }) {
  const value = useLiveValue(member.nodeClass === "Variable" ? member.nodeId : null);
  return <span className="ml-auto min-w-0 truncate font-mono text-ink-2">{value ? showValue(value.sample, member.range) : ""}</span>;
}
