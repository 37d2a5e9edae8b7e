import { href, useParams } from "react-router";
import { FerruleBadge } from "~/components/notation/ferrule-badge";
import { TextLink } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { RowHead, Table, TableScroll, Td, Th } from "~/components/ui/table";
import { Tag } from "~/components/ui/tag";
import { formatRange } from "~/domain/live/format-live";
import type { Target } from "~/domain/mapping/list-targets";
import { unitByCode } from "~/domain/units/units";
import type { SignalEntry } from "./build-signals";
import { deliveryWords, stateWords, type SignalState } from "./survey-words";

type Props = {
  entries: readonly SignalEntry[];
  selected: string | undefined;
  /** The member that a signal became, and whether it is fed. */
  members: ReadonlyMap<string, { readonly target: Target; readonly isFed: boolean }>;
  onSelect: (id: string) => void;
};

const stateTones: Readonly<Record<SignalState, "plain" | "ink" | "copper">> = {
  wanted: "plain",
  open: "plain",
  decided: "ink",
  built: "ink",
  dropped: "plain",
};

export function SurveyTable({ entries, selected, members, onSelect }: Props) {
  const { modelId = "" } = useParams();
  return (
    <TableScroll label="Signals">
      <Table caption="Surveyed signals" className="min-w-240">
        <thead>
          <tr>
            <Th>Signal</Th>
            <Th>Group</Th>
            <Th>Wanted by</Th>
            <Th>Source or sensor</Th>
            <Th>Unit</Th>
            <Th right>Range</Th>
            <Th right>Evidence</Th>
            <Th>State</Th>
            <Th>Member</Th>
          </tr>
        </thead>
        <tbody>
          {entries.map(({ id, value }) => {
            const member = value.target === undefined ? undefined : members.get(value.target);
            return (
              <tr
                key={id}
                className={cx(
                  "align-top",
                  selected === id ? "bg-copper-wash shadow-[inset_3px_0_0_var(--copper)]" : "hover:bg-bench",
                  value.state === "dropped" && "text-ink-3",
                )}
              >
                <RowHead className="p-0!">
                  <button
                    type="button"
                    aria-pressed={selected === id}
                    onClick={() => onSelect(id)}
                    className={cx(
                      "w-full py-1 pl-2 text-left font-semibold focus-visible:-outline-offset-2",
                      value.state === "dropped" && "line-through",
                    )}
                  >
                    {value.name}
                  </button>
                </RowHead>
                <Td className="py-1">{value.group}</Td>
                <Td className="max-w-44 py-1">
                  {value.wantedBy.length === 0 ? (
                    <span className="text-ink-3">nobody yet</span>
                  ) : (
                    value.wantedBy.join(", ")
                  )}
                </Td>
                <Td className="max-w-80 py-1">
                  <span className={value.delivery.kind === "none" ? "text-ink-3" : "text-ink-2"}>
                    {deliveryWords[value.delivery.kind]}
                  </span>
                  {value.delivery.text ? <span className="ml-2">{value.delivery.text}</span> : null}
                </Td>
                <Td className="py-1">
                  {value.unit === undefined ? "" : (unitByCode(value.unit)?.symbol ?? value.unit)}
                </Td>
                <Td right mono className="py-1 whitespace-nowrap">
                  {value.range ? formatRange(value.range) : ""}
                </Td>
                <Td right mono className="py-1">
                  {value.evidence.length === 0 ? "" : value.evidence.length}
                </Td>
                <Td className="py-1">
                  <Tag tone={stateTones[value.state]}>{stateWords[value.state]}</Tag>
                </Td>
                <Td className="py-1">
                  {member ? (
                    <span className="flex items-center gap-1.5">
                      <FerruleBadge feed={member.isFed ? "fed" : "open"} width={18} />
                      <TextLink
                        to={`${href("/models/:modelId/mapping", { modelId })}?target=${encodeURIComponent(member.target.target)}`}
                      >
                        {member.target.path}
                      </TextLink>
                    </span>
                  ) : value.target === undefined ? null : (
                    <span className="text-ink-3">gone from the type</span>
                  )}
                </Td>
              </tr>
            );
          })}
        </tbody>
      </Table>
    </TableScroll>
  );
}
