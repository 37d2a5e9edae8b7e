/** An edited source text held against the model: what it would change, or why it cannot. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getPath } from "~/domain/address-space/browse";
import type { Finding } from "~/domain/checks/finding";
import { runChecks } from "~/domain/checks/run-checks";
import type { Problem, Severity } from "~/domain/core/result";
import { diffToOperations } from "~/domain/editing/diff-to-operations";
import type { Operation } from "~/domain/editing/operation";
import { rebase } from "~/domain/editing/rebase";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { describe } from "../model/edit-steps";

export type SourceNote = { readonly severity: Severity; readonly line: number | undefined; readonly text: string };

export type CheckedSource =
  | {
      readonly ok: true;
      readonly operations: readonly Operation[];
      readonly counts: { readonly added: number; readonly changed: number; readonly removed: number };
      /** Findings that the edit would bring, and what the reader had to say. */
      readonly notes: readonly SourceNote[];
    }
  | { readonly ok: false; readonly notes: readonly SourceNote[] };

/** `base` is the model that the text was written from, `current` what it has become since by the edits of others. */
export function checkSource(base: AddressSpace, current: AddressSpace, text: string): CheckedSource {
  const read = readNodeSet(text);
  if (!read.ok || !read.value.isWhole) return { ok: false, notes: read.problems.map((found) => toNote(base, found)) };
  const { lines } = read.value;
  const noteAt = (found: Problem): SourceNote => toNote(current, found, found.at?.node === undefined ? undefined : lines.get(found.at.node as never)?.line);
  const difference = diffToOperations(base, read.value);
  if (!difference.ok) return { ok: false, notes: difference.problems.map(noteAt) };
  const { operations, added, changed, removed } = difference.value;
  const counts = { added: added.length, changed: changed.length, removed: removed.length };
  const rebased = rebase(current, listForeign(base, current), [{ operations }]);
  const [refused] = rebased.refused;
  if (refused) {
    const others = { severity: "error" as const, line: undefined, text: "Somebody changed the same place while this text was edited:" };
    return { ok: false, notes: [others, ...refused.problems.map(noteAt)] };
  }
  const notes = [...read.problems.map((found) => toNote(base, found)), ...listNewFindings(current, rebased.space).map((finding) => toFindingNote(rebased.space, finding, lines))];
  return { ok: true, operations, counts, notes };
}

/** What others did since, as operations: the way from one text to the other. */
function listForeign(base: AddressSpace, current: AddressSpace): { operations: readonly Operation[] }[] {
  if (base.own === current.own) return [];
  const written = writeNodeSet({ header: current.own.header, nodes: current.listOwnNodes() }, { findNodeId: (key) => current.getNode(key)?.nodeId });
  const read = readNodeSet(written.xml);
  const difference = read.ok ? diffToOperations(base, read.value) : read;
  return difference.ok ? [{ operations: difference.value.operations }] : [];
}

function listNewFindings(before: AddressSpace, after: AddressSpace): Finding[] {
  const nameOf = ({ rule, key, message }: Finding): string => `${rule} ${key ?? ""} ${message}`;
  const known = new Set(runChecks(before).map(nameOf));
  return runChecks(after).filter((finding) => !known.has(nameOf(finding)));
}

function toNote(space: AddressSpace, found: Problem, line = found.at?.line): SourceNote {
  return { severity: found.severity, line, text: describe(space, [found]).join(" ") };
}

function toFindingNote(space: AddressSpace, { rule, severity, message, key }: Finding, lines: ReadonlyMap<string, { line: number }>): SourceNote {
  const place = key === undefined ? "" : `${getPath(space, key).replaceAll("/", " / ")}: `;
  return { severity, line: key === undefined ? undefined : lines.get(key)?.line, text: `${rule} ${place}${message}` };
}
