/** Who did what when, as a file. */
import { listAudit, type AuditRow } from "../db/repositories/audit.server";
import { writeCsvLine } from "../utils/write-csv";

type AuditLine = {
  readonly id: number;
  readonly at: string;
  readonly who: string;
  readonly action: string;
  readonly subjectKind: string;
  readonly subject: string;
  readonly details: Readonly<Record<string, unknown>>;
};

const EXPORT_PAGE = 1000;

function toLine(row: AuditRow): AuditLine {
  const { id, at, userName, action, subjectKind, subjectName, details } = row;
  return { id, at: at.toISOString(), who: userName, action, subjectKind, subject: subjectName, details };
}

const columns = ["id", "at", "who", "action", "subjectKind", "subject", "details"] as const;

/** The whole audit as CSV (RFC 4180), newest first, page by page. */
export async function* exportAudit(organizationId: string): AsyncGenerator<string> {
  yield `${columns.join(",")}\r\n`;
  let before: number | undefined;
  for (;;) {
    const rows = await listAudit(organizationId, EXPORT_PAGE, before);
    if (rows.length === 0) return;
    yield rows.map((row) => toCsvLine(toLine(row))).join("");
    before = rows.at(-1)?.id;
  }
}

function toCsvLine(line: AuditLine): string {
  const cells = columns.map((column) => (column === "details" ? JSON.stringify(line.details) : String(line[column])));
  return writeCsvLine(cells);
}
