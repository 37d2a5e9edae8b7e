/** Where a row's value comes from, in words that fit into a cell. Pure; sheet and register use it too. */
import { findFieldName } from "../frames/field-name";
import type { Feed } from "../notation/ferrule-badge";
import type { ProcessDataImage } from "~/domain/iodd/device-description";
import type { InputReference, RowContent, SourceReference } from "~/domain/mapping/mapping";
import type { Role } from "~/domain/mapping/mapping-parts";

export type Roles = ReadonlyMap<string, Role>;

export const tableWords = {
  coil: "coil",
  "discrete-input": "discrete input",
  "holding-register": "holding register",
  "input-register": "input register",
} as const;

const kindWords: Readonly<Record<SourceReference["kind"], string>> = {
  "process-data": "Process data field",
  parameter: "Parameter",
  "port-status": "Port status",
  validity: "Validity bit",
  "device-status": "Device status",
  "event-code": "Event",
  register: "Register",
  tag: "Tag",
  "json-path": "JSON field",
  "opc-ua-node": "OPC UA node",
  constant: "Constant",
  formula: "Formula",
};

/** Every kind of the closed union with its word, in the order of the menu. */
export const sourceKinds = Object.entries(kindWords) as readonly (readonly [SourceReference["kind"], string])[];

/** `fed`, `constant`, or `open` when there is no row. */
export function feedOf(row: RowContent | undefined): Feed {
  if (!row) return "open";
  return row.source.kind === "constant" ? "constant" : "fed";
}

/** `creel sensor · Distance`, `controller · holding register 10`, `= position − setpoint`. */
export function describeSource(source: SourceReference, roles: Roles): string {
  const role = "role" in source ? `${source.role} · ` : "";
  return `${role}${describePlace(source, roles)}`;
}

/** The same without the role. */
export function describePlace(source: SourceReference, roles: Roles): string {
  switch (source.kind) {
    case "process-data": {
      const name = nameField(roles.get(source.role), source.direction, source.subindex);
      return `${name ?? (source.subindex === 0 ? "process data" : `field ${source.subindex}`)}${source.direction === "out" ? ", as set" : ""}`;
    }
    case "parameter":
      return `parameter ${source.index}${source.subindex === 0 ? "" : `.${source.subindex}`}`;
    case "port-status":
      return "port status";
    case "validity":
      return `process data ${source.direction} valid`;
    case "device-status":
      return `worst status of ${source.roles.join(", ")}`;
    case "event-code":
      return `event 0x${source.code.toString(16).toUpperCase().padStart(4, "0")}`;
    case "register":
      return `${tableWords[source.table]} ${source.address}${source.bit === undefined ? "" : `, bit ${source.bit}`}`;
    case "tag":
      return source.name;
    case "json-path":
      return source.path.join("/");
    case "opc-ua-node":
      return source.nodeId;
    case "constant":
      return `= ${String(source.value)}`;
    case "formula":
      return `= ${source.expression.replace(/-/g, "−")}`;
  }
}

/** The roles that a reference reads, inputs of a formula included. */
export function listRolesOf(source: SourceReference): string[] {
  if (source.kind === "formula") {
    const inputs = Object.values(source.inputs);
    return [
      ...new Set(inputs.flatMap((input) => (input.kind === "member" ? [] : listRolesOf(input as InputReference)))),
    ];
  }
  if (source.kind === "device-status") return source.roles;
  return "role" in source ? [source.role] : [];
}

function nameField(role: Role | undefined, direction: "in" | "out", subindex: number): string | undefined {
  const image = role?.layouts?.[direction] as ProcessDataImage | undefined;
  return image && findFieldName(image, subindex);
}
