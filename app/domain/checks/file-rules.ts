/** Rules about the text of a file, which the graph of its nodes cannot show; `ferrule check` and imports ask them. */
import type { Severity } from "../core/result";
import { clause } from "./rule";

export type FileRule = {
  readonly id: `R${number}`;
  readonly title: string;
  readonly severity: Severity;
  readonly clause: string;
  readonly condition: string;
  readonly why: string;
};

export const SCHEMA_VALID: FileRule = {
  id: "R191",
  title: "Schema valid",
  severity: "error",
  clause: `UANodeSet.xsd, ${clause(6, "§F.1, §F.7")}`,
  condition:
    "The file validates against UANodeSet.xsd: known elements and attributes, in the order of the schema, values of their types. DesignToolOnly, which the edition of 1.05.02 left out, is allowed.",
  why: "Loaders that read by the schema refuse the file as a whole, others drop what they do not expect.",
};

export const FILE_RULES: readonly FileRule[] = [SCHEMA_VALID];
