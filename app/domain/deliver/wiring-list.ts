/** The wiring list: one row a port, unit or server, as a fitter takes it to the cabinet. */
import { formatCsv } from "./csv";

export type WiringRow = {
  readonly source: string;
  readonly kind: string;
  readonly address: string;
  /** `port 3`, `unit 12`, "" for a server. */
  readonly place: string;
  readonly portClass: string;
  readonly mode: string;
  readonly cycle: string;
  readonly machine: string;
  readonly role: string;
  readonly device: string;
  readonly serialNumber: string;
  readonly note: string;
};

const COLUMNS: readonly (readonly [name: string, value: (row: WiringRow) => string])[] = [
  ["Source", (r) => r.source],
  ["Kind", (r) => r.kind],
  ["Address", (r) => r.address],
  ["Port or unit", (r) => r.place],
  ["Class", (r) => r.portClass],
  ["Mode", (r) => r.mode],
  ["Cycle", (r) => r.cycle],
  ["Machine", (r) => r.machine],
  ["Role", (r) => r.role],
  ["Device", (r) => r.device],
  ["Serial number", (r) => r.serialNumber],
  ["Note", (r) => r.note],
];

export function writeWiringCsv(rows: readonly WiringRow[]): string {
  return formatCsv([COLUMNS.map(([name]) => name), ...rows.map((row) => COLUMNS.map(([, value]) => value(row)))]);
}
