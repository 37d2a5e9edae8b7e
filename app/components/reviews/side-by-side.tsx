import { useState } from "react";
import { DifferenceBadge } from "~/components/notation/difference-badge";
import { cx } from "~/components/ui/cx";
import { Checkbox } from "~/components/ui/field";
import { TableScroll } from "~/components/ui/table";
import type { AlignedMember, AlignedOwner, Cells } from "~/domain/release/align-interfaces";

const columns: readonly (readonly [keyof Cells, string])[] = [
  ["path", "Member"],
  ["dataType", "Data type"],
  ["unit", "Unit"],
  ["range", "Range"],
  ["access", "Access"],
  ["rule", "Rule"],
  ["description", "Description"],
];

/** The register of both states, member by member on one line. */
export function SideBySide({ owners, names }: { owners: readonly AlignedOwner[]; names: readonly [string, string] }) {
  const [showsAll, setShowsAll] = useState(false);
  const shown = owners.filter((owner) => showsAll || owner.difference !== "same");
  return (
    <main id="main" tabIndex={-1} className="min-h-0 flex-1 overflow-y-auto px-5 pb-8 outline-none">
      <div className="flex items-center gap-4 py-2">
        <h2 className="text-lead font-semibold">
          <span className="font-mono">{names[0]}</span> beside <span className="font-mono">{names[1]}</span>
        </h2>
        <Checkbox
          label="Also what is the same"
          checked={showsAll}
          onChange={(event) => setShowsAll(event.currentTarget.checked)}
        />
      </div>
      {shown.length === 0 ? (
        <p className="border-t border-ink py-3 text-small text-ink-2">No type and no machine has changed.</p>
      ) : null}
      {shown.map((owner) => (
        <OwnerTable key={owner.nodeId} owner={owner} names={names} showsAll={showsAll} />
      ))}
    </main>
  );
}

function OwnerTable({
  owner,
  names,
  showsAll,
}: {
  owner: AlignedOwner;
  names: readonly [string, string];
  showsAll: boolean;
}) {
  const members = owner.members.filter((member) => showsAll || member.difference !== "same");
  return (
    <section className="mb-6">
      <h3 className="flex items-center gap-2 py-1 text-body font-semibold">
        {owner.difference === "same" ? null : <DifferenceBadge difference={owner.difference} />}
        <span className={cx(owner.kind === "type" && "italic")}>{owner.name}</span>
        {owner.basedOn.before !== owner.basedOn.after && owner.difference === "changed" ? (
          <span className="text-small font-normal text-ink-2">
            based on {owner.basedOn.after}, was {owner.basedOn.before}
          </span>
        ) : null}
      </h3>
      <TableScroll label={`Members of ${owner.name} in both states`}>
        <table className="w-full border-collapse text-small">
          <caption className="sr-only">Members of {owner.name} in both states</caption>
          <thead>
            <tr>
              <th scope="col" rowSpan={2} className="w-6 border-b border-ink">
                <span className="sr-only">Difference</span>
              </th>
              {names.map((name, side) => (
                <th
                  key={side}
                  scope="colgroup"
                  colSpan={columns.length}
                  className={cx(
                    "text-left font-mono text-note font-semibold",
                    side === 1 && "border-l border-ink pl-2",
                  )}
                >
                  {name}
                </th>
              ))}
            </tr>
            <tr>
              {[0, 1].map((side) =>
                columns.map(([name, label], i) => (
                  <th
                    key={`${side} ${name}`}
                    scope="col"
                    className={cx(
                      "h-6 border-b border-ink px-2 text-left text-note font-medium text-ink-3",
                      side === 1 && i === 0 && "border-l border-l-ink",
                    )}
                  >
                    {label}
                  </th>
                )),
              )}
            </tr>
          </thead>
          <tbody>
            {members.map((member, i) => (
              <MemberRow key={`${member.after?.nodeId ?? member.before?.nodeId ?? ""} ${i}`} member={member} />
            ))}
          </tbody>
        </table>
      </TableScroll>
    </section>
  );
}

function MemberRow({ member }: { member: AlignedMember }) {
  return (
    <tr>
      <td className="border-b border-hair">
        {member.difference === "same" ? null : <DifferenceBadge difference={member.difference} />}
      </td>
      {([member.before, member.after] as const).map((cells, side) =>
        columns.map(([name], i) => (
          <td
            key={`${side} ${name}`}
            className={cx(
              "h-6 border-b border-hair px-2 align-top",
              name === "path" && "font-semibold",
              side === 1 && i === 0 && "border-l border-l-ink",
              (!member.before || !member.after || member.changed.includes(name)) &&
                cells &&
                (side === 0 ? "bg-removed-wash" : "bg-added-wash"),
              name === "description" && "max-w-64 truncate",
            )}
            title={name === "description" ? cells?.[name] : undefined}
          >
            {cells?.[name] ?? ""}
          </td>
        )),
      )}
    </tr>
  );
}
