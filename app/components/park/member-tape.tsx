import type { MachineGroup } from "~/domain/instantiation/list-machines";
import { cx } from "~/components/ui/cx";

type Member = MachineGroup["members"][number];

/** A member that is an Object is fed where something below it is. */
export function isMapped({ path }: Member, mapped: readonly string[] | null): boolean {
  return mapped !== null && mapped.some((one) => one === path || one.startsWith(`${path}/`));
}

/**
 * One cell a declared member: filled where a source feeds it, open where the machine has it and nothing feeds it, hatched
 * where it has not. Without a mapping all that is there is filled.
 */
export function MemberTape({ group, mapped }: { group: MachineGroup; mapped: readonly string[] | null }) {
  const present = group.members.filter((member) => member.isPresent);
  const fed = mapped === null ? present : present.filter((member) => isMapped(member, mapped));
  const open = present.filter((member) => !fed.includes(member)).map((member) => member.name);
  const missing = group.members.filter((member) => !member.isPresent).map((member) => member.name);
  const words = [
    `${group.name}: ${fed.length} of ${mapped === null ? group.members.length : present.length} members${mapped === null ? "" : " fed"}`,
    ...(open.length > 0 ? [`nothing feeds ${open.join(", ")}`] : []),
    ...(missing.length > 0 ? [`without ${missing.join(", ")}`] : []),
  ].join(", ");
  return (
    <span className="flex items-center justify-between gap-2" title={words}>
      <span role="img" aria-label={words} className="flex h-[9px] w-24 border border-ink-2 bg-paper max-[1400px]:md:w-[76px]">
        {group.members.map((member) => (
          <span
            key={member.path}
            className={cx("flex-1 border-l border-leaf first:border-l-0", fed.includes(member) ? "bg-ink-2" : member.isPresent ? "bg-paper" : "hatch")}
          />
        ))}
      </span>
      <span aria-hidden className="font-mono">
        <b className={cx(fed.length < (mapped === null ? group.members.length : present.length) ? "font-semibold" : "font-normal")}>{fed.length}</b>
        <span className="text-ink-3">/{mapped === null ? group.members.length : present.length}</span>
      </span>
    </span>
  );
}
