import { ArrowLeftFromLine } from "lucide-react";
import { Button } from "~/components/ui/button";
import type { RowContent } from "~/domain/mapping/mapping";
import { toRowId } from "~/domain/mapping/type-mapping";
import type { Roles } from "./describe-source";
import { viewRoleFrame } from "./view-role-frame";
import type { Member } from "./mapping-scene";
import type { MappingActions } from "./use-mapping-actions";

type Props = {
  member: Member;
  members: readonly Member[];
  roles: Roles;
  actions: MappingActions;
  onAdded: (id: string) => void;
};

/** Lets a Variable write an output of a source: process data out of a device, or a register. It starts without limits, so nothing is written yet. */
export function AddOutput({ member, members, roles, actions, onAdded }: Props) {
  const { target } = member;
  const id = toRowId(target.target, "out");
  const source = findOutput(roles);
  if (members.some((one) => one.id === id)) return null;
  return (
    <Button
      size="small"
      tone="bare"
      icon={ArrowLeftFromLine}
      blockedBy={actions.blockedBy ?? (source ? undefined : "no source has an output")}
      onClick={() => {
        if (source && actions.setRow(id, { direction: "out", source, transforms: [] })) onAdded(id);
      }}
    >
      Write to an output
    </Button>
  );
}

function findOutput(roles: Roles): RowContent["source"] | undefined {
  for (const [role, value] of roles) {
    const field = viewRoleFrame(value, "out")?.fields[0];
    if (field) return { kind: "process-data", role, direction: "out", subindex: field.subindex };
  }
  const unit = [...roles].find(([, value]) => value.kind === "modbus-unit");
  return unit && { kind: "register", role: unit[0], table: "holding-register", address: 0, type: "UInt16" };
}
