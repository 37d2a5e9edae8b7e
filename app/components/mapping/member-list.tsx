import { useRef, type DragEvent, type KeyboardEvent } from "react";
import { FerruleBadge } from "~/components/notation/ferrule-badge";
import { FindingBadge } from "~/components/notation/finding-badge";
import { StatusShape } from "~/components/notation/status-badge";
import { cx } from "~/components/ui/cx";
import type { Badge } from "~/components/model/use-model";
import type { NodeKey } from "~/domain/address-space/node-id";
import { describeSource, feedOf, type Roles } from "./describe-source";
import { describeChain } from "./describe-transform";
import { groupMembers, nameMember, type Member } from "./mapping-scene";
import type { NodeReading } from "./bench-readings";
import { Terminal } from "./terminal";

type Props = {
  members: readonly Member[];
  roles: Roles;
  selected: string | undefined;
  /** Targets for which a suggestion is open. */
  suggested: ReadonlySet<string>;
  readings: ReadonlyMap<string, NodeReading>;
  badges: ReadonlyMap<NodeKey, Badge>;
  /** A field that is picked or dragged waits for its Variable. */
  isWaiting: boolean;
  onPick: (id: string) => void;
  onLeave: () => void;
};

/** The terminal strip: the Variables of the type in their groups. Arrow keys walk; Enter lands what was picked. */
export function MemberList({ members, selected, isWaiting, onPick, onLeave, ...rest }: Props) {
  const list = useRef<HTMLDivElement>(null);
  const stop = members.some((member) => member.id === selected) ? selected : members[0]?.id;

  function onKeyDown(event: KeyboardEvent): void {
    if (event.key === "Escape") {
      onLeave();
      return;
    }
    const step = { ArrowDown: 1, ArrowUp: -1, Home: -100_000, End: 100_000 }[event.key];
    const rows = [...(list.current?.querySelectorAll<HTMLElement>("[data-member]") ?? [])];
    const at = rows.findIndex((row) => row === document.activeElement);
    if (step === undefined || at < 0) return;
    event.preventDefault();
    rows[Math.max(0, Math.min(rows.length - 1, at + step))]?.focus();
  }

  return (
    <div
      ref={list}
      role="group"
      aria-label="Variables of the type"
      onKeyDown={onKeyDown}
      className="border-[1.5px] border-ink bg-leaf"
    >
      {groupMembers(members).map(({ group, members: inGroup }) => (
        <section key={group} aria-label={group || "Without a group"}>
          {group ? (
            <h3 className="flex h-6 items-center border-b border-rule bg-bench pr-2 pl-8 text-note font-medium text-ink-2">
              {group}
            </h3>
          ) : null}
          <ul>
            {inGroup.map((member) => (
              <MemberRow
                key={member.id}
                member={member}
                isSelected={member.id === selected}
                isTabStop={member.id === stop}
                isWaiting={isWaiting}
                onPick={onPick}
                {...rest}
              />
            ))}
          </ul>
        </section>
      ))}
    </div>
  );
}

type RowProps = Omit<Props, "members" | "selected" | "onLeave"> & {
  member: Member;
  isSelected: boolean;
  isTabStop: boolean;
};

function MemberRow({ member, roles, isSelected, isTabStop, isWaiting, suggested, readings, badges, onPick }: RowProps) {
  const { id, target, row } = member;
  const isSuggested = !row && suggested.has(target.target);
  const feed = isSuggested ? "suggested" : feedOf(row);
  const source = row ? describeSource(row.source, roles) : isSuggested ? "suggestion" : "";
  const chain = row ? describeChain(row.transforms) : "";
  const reading = readings.get(id);
  const badge = badges.get(target.key);
  const name = nameMember(target);
  const words = [
    name,
    target.dataTypeName,
    target.unit?.symbol ?? "",
    row ? `${row.direction === "out" ? "writes to" : "fed by"} ${source}` : "nothing feeds it",
    chain,
    reading ? `value ${reading.text} ${reading.unit}, ${reading.status}` : "",
  ];
  function allow(event: DragEvent): void {
    event.preventDefault();
    event.dataTransfer.dropEffect = "link";
    event.currentTarget.setAttribute("data-over", "");
  }
  return (
    <li className="border-b border-hair last:border-b-0">
      <button
        type="button"
        data-member={id}
        tabIndex={isTabStop ? 0 : -1}
        aria-label={words.filter((word) => word !== "").join(", ")}
        aria-pressed={isSelected}
        onClick={() => onPick(id)}
        {...(isWaiting
          ? {
              onDragOver: allow,
              onDragLeave: (event: DragEvent) => event.currentTarget.removeAttribute("data-over"),
              onDrop: (event: DragEvent) => {
                event.preventDefault();
                event.currentTarget.removeAttribute("data-over");
                onPick(id);
              },
            }
          : {})}
        className={cx(
          "grid h-7 w-full grid-cols-[18px_minmax(0,1fr)_auto_auto] items-center gap-2 pr-2 text-left text-small focus-visible:-outline-offset-2",
          "data-over:bg-copper-wash data-over:shadow-[inset_0_0_0_1.5px_var(--copper)]",
          isSelected ? "bg-copper-wash" : isWaiting ? "hover:bg-copper-wash" : "hover:bg-bench",
        )}
      >
        <span className="-ml-[10px]">
          <Terminal id={id} feed={feed} isHere={isSelected} />
        </span>
        <span className="flex min-w-0 items-baseline gap-1.5">
          <span className="truncate font-semibold">{name}</span>
          <span className="shrink-0 font-mono text-note text-ink-2">
            {target.dataTypeName} {target.unit?.symbol}
          </span>
          {target.isMandatory ? null : <span className="font-mono text-note text-ink-3">0..1</span>}
        </span>
        <span className="flex min-w-0 items-center gap-1.5 text-note text-ink-2">
          {badge ? <FindingBadge severity={badge.severity} count={badge.count} title={badge.title} /> : null}
          {row?.direction === "out" ? <span className="border border-ink px-1 text-ink">out</span> : null}
          {chain ? (
            <span className="border border-rule bg-leaf px-1 font-mono whitespace-nowrap text-ink">{chain}</span>
          ) : null}
          {row && row.source.kind !== "process-data" ? <span className="max-w-40 truncate">{source}</span> : null}
          {!row ? <FerruleBadge feed={isSuggested ? "suggested" : "open"} width={18} /> : null}
        </span>
        {reading ? (
          <span className="flex min-w-20 items-center justify-end gap-1.5">
            <StatusShape status={reading.tone} />
            <span className="max-w-32 truncate font-mono font-semibold">
              {reading.text} {reading.unit}
            </span>
          </span>
        ) : (
          <span />
        )}
      </button>
    </li>
  );
}
