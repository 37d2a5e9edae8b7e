import { DifferenceBadge } from "~/components/notation/difference-badge";
import { NodeClassGlyph } from "~/components/notation/node-class-glyph";
import { cx } from "~/components/ui/cx";
import type { NodeClass } from "~/domain/address-space/node";
import type { AlignedMember, AlignedOwner } from "~/domain/release/align-interfaces";

/** Both states in one drawing: cards of the types and machines that changed, what went struck through, what came marked. */
export function OverlaidCards({
  owners,
  names,
}: {
  owners: readonly AlignedOwner[];
  names: readonly [string, string];
}) {
  const changed = owners.filter((owner) => owner.difference !== "same");
  return (
    <main
      id="main"
      tabIndex={-1}
      className="min-h-0 flex-1 overflow-y-auto bg-[radial-gradient(var(--grid)_1.2px,transparent_1.2px)] bg-size-[16px_16px] p-10 outline-none max-sm:p-4"
    >
      <h2 className="sr-only">
        {names[0]} and {names[1]} overlaid
      </h2>
      {changed.length === 0 ? <p className="text-small text-ink-2">No type and no machine has changed.</p> : null}
      <div className="columns-[320px] gap-8">
        {changed.map((owner) => (
          <OwnerCard key={owner.nodeId} owner={owner} />
        ))}
      </div>
    </main>
  );
}

const MAX_SAME = 4;

function OwnerCard({ owner }: { owner: AlignedOwner }) {
  const same = owner.members.filter((member) => member.difference === "same");
  const rows = [...owner.members.filter((member) => member.difference !== "same"), ...same.slice(0, MAX_SAME)];
  const isType = owner.kind === "type";
  return (
    <section
      aria-label={owner.name}
      className={cx(
        "mb-8 break-inside-avoid border-[1.5px] border-ink bg-leaf",
        isType && "shadow-[5px_5px_0_var(--shade)]",
        owner.difference === "removed" && "opacity-80",
      )}
    >
      <header className="flex h-8 items-center gap-2 border-b border-ink px-2">
        {owner.difference === "same" ? null : <DifferenceBadge difference={owner.difference} />}
        <h3
          className={cx(
            "min-w-0 truncate font-semibold",
            isType && "italic",
            owner.difference === "removed" && "line-through",
          )}
        >
          {owner.name}
        </h3>
        <span className="ml-auto truncate text-note text-ink-3">{owner.basedOn.after ?? owner.basedOn.before}</span>
      </header>
      <ul>
        {rows.map((member, i) => (
          <MemberLine key={`${member.after?.nodeId ?? member.before?.nodeId ?? ""} ${i}`} member={member} />
        ))}
        {same.length > MAX_SAME ? (
          <li className="px-2 py-1 text-note text-ink-3">{same.length - MAX_SAME} more that are the same</li>
        ) : null}
      </ul>
    </section>
  );
}

function MemberLine({ member }: { member: AlignedMember }) {
  const cells = member.after ?? member.before;
  if (!cells) return null;
  const tone = {
    same: "text-ink-3",
    added: "bg-added-wash",
    removed: "bg-removed-wash line-through",
    changed: "bg-changed-wash",
  }[member.difference];
  return (
    <li className={cx("border-b border-hair px-2 py-0.5 text-small last:border-b-0", tone)}>
      <span className="flex min-h-6 items-center gap-2">
        {member.difference === "same" ? (
          <span className="w-[13px]" />
        ) : (
          <DifferenceBadge difference={member.difference} />
        )}
        <NodeClassGlyph kind={cells.nodeClass as NodeClass} />
        <span className="min-w-0 truncate font-medium">{cells.path}</span>
        <span className="ml-auto shrink-0 text-note text-ink-3">
          {cells.dataType}
          {cells.unit === "" ? "" : ` · ${cells.unit}`}
        </span>
      </span>
      {member.changed.map((name) => (
        <span key={name} className="block pl-11 font-mono text-note">
          <span className="text-removed line-through">{member.before?.[name] || "none"}</span> →{" "}
          <span className="text-added underline">{member.after?.[name] || "none"}</span>
        </span>
      ))}
    </li>
  );
}
