/** A reference of a kind as it starts, on the role that suits it best. Pure. */
import type { SourceReference } from "~/domain/mapping/mapping";
import type { Roles } from "./describe-source";
import { viewRoleFrame } from "./view-role-frame";

const suits: Readonly<Partial<Record<SourceReference["kind"], string>>> = {
  "process-data": "io-link-device",
  parameter: "io-link-device",
  "port-status": "io-link-device",
  validity: "io-link-device",
  "device-status": "io-link-device",
  "event-code": "io-link-device",
  register: "modbus-unit",
  tag: "tag-server",
  "json-path": "rest-service",
  "opc-ua-node": "opc-ua-server",
};

export function makeReference(kind: SourceReference["kind"], roles: Roles): SourceReference {
  const [role = "source", known] = [...roles].find(([, value]) => value.kind === suits[kind]) ?? [...roles][0] ?? [];
  switch (kind) {
    case "process-data": {
      const direction = known?.layouts?.in || !known?.layouts?.out ? "in" : "out";
      return { kind, role, direction, subindex: (known && viewRoleFrame(known, direction)?.fields[0]?.subindex) ?? 0 };
    }
    case "parameter":
      return { kind, role, index: 24, subindex: 0 };
    case "port-status":
      return { kind, role };
    case "validity":
      return { kind, role, direction: "in" };
    case "device-status":
      return { kind, roles: [role] };
    case "event-code":
      return { kind, role, code: 0x8c01 };
    case "register":
      return { kind, role, table: "holding-register", address: 0, type: "UInt16" };
    case "tag":
      return { kind, role, name: "Tag" };
    case "json-path":
      return { kind, role, path: ["value"] };
    case "opc-ua-node":
      return { kind, role, nodeId: "i=2258" };
    case "constant":
      return { kind, value: 0 };
    case "formula":
      return { kind, expression: "0", inputs: {} };
  }
}
