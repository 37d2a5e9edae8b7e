import type { MachineGroup } from "~/domain/instantiation/list-machines";
import { cx } from "~/components/ui/cx";

/** One cell a declared member: filled where the machine has it, hatched where it has not. */
export function MemberTape({ group, pale }: { group: MachineGroup; pale?: boolean }) {
  const present = group.members.filter((member) => member.isPresent).length;
  const missing = group.members.filter((member) => !member.isPresent).map((member) => member.name);
  const words = `${group.name}: ${present} of ${group.members.length} members${missing.length > 0 ? `, without ${missing.join(", ")}` : ""}`;
  return (
    <span className="flex items-center justify-between gap-2" title={words}>
      <span
        role="img"
        aria-label={words}
        className={cx(
          "flex h-[9px] w-24 border max-[1400px]:md:w-[76px] bg-paper",
          pale ? "border-ink-3" : "border-ink-2",
        )}
      >
        {group.members.map((member) => (
          <span
            key={member.name}
            className={cx(
              "flex-1 border-l border-leaf first:border-l-0",
              member.isPresent ? (pale ? "bg-ink-3" : "bg-ink-2") : "hatch",
            )}
          />
        ))}
      </span>
      <span aria-hidden className="font-mono">
        <b className={cx(present < group.members.length ? "font-semibold" : "font-normal")}>{present}</b>
        <span className="text-ink-3">/{group.members.length}</span>
      </span>
    </span>
  );
}
