/** `compare`: what changed between two NodeSet2 files, by meaning. */
import { AddressSpace, buildLayer } from "../domain/address-space/address-space";
import { getOwnNamespace } from "../domain/address-space/model-header";
import type { Change, ChangeRating, Comparison } from "../domain/compare/change";
import { compareModels } from "../domain/compare/compare-models";
import type { Result } from "../domain/core/result";
import { listRequired } from "../library/describe-nodeset.server";
import type { LibraryEntry } from "../library/library-entry";
import { getLibrary } from "../library/library.server";
import type { CompareCommand } from "./parse-command-line";
import { refuse } from "./print-problems";
import { readFolders, readInput } from "./read-input";

const EXIT_CODES: Readonly<Record<ChangeRating, number>> = { neutral: 0, additive: 1, breaking: 3 };

export async function compare(command: CompareCommand): Promise<number> {
  const folders = await readFolders(command.folders);
  if (!folders.ok) return refuse(command, "--with", folders.problems);
  const before = await loadSpace(command.before, folders.value);
  if (!before.ok) return refuse(command, command.before, before.problems);
  const after = await loadSpace(command.after, folders.value);
  if (!after.ok) return refuse(command, command.after, after.problems);
  const comparison = compareModels(before.value, after.value);
  process.stdout.write(
    command.isJson ? `${JSON.stringify(toJson(comparison), null, 2)}\n` : formatComparison(comparison),
  );
  return comparison.rating === undefined ? 0 : EXIT_CODES[comparison.rating];
}

/** Missing required models do not stop a comparison: names of foreign nodes then stay NodeIds. */
async function loadSpace(file: string, extra: readonly LibraryEntry[]): Promise<Result<AddressSpace>> {
  const content = await readInput(file);
  if (!content.ok) return content;
  const { header, nodes } = content.value;
  const layers = await getLibrary().resolve(listRequired(header), { extra, requiredBy: getOwnNamespace(header) });
  if (!layers.ok) return layers;
  return { ok: true, value: AddressSpace.of(layers.value, buildLayer(header, nodes)), problems: content.problems };
}

function toJson(comparison: Comparison) {
  return {
    changes: comparison.changes.map(({ kind, nodeId, path, detail, rating, reason, clause, before, after }) => ({
      kind,
      nodeId: nodeId ?? null,
      path,
      detail: detail ?? null,
      rating,
      reason,
      clause,
      before,
      after,
    })),
    rating: comparison.rating ?? null,
    proposedVersion: comparison.proposedVersion ?? null,
  };
}

function formatComparison({ changes, rating, proposedVersion }: Comparison): string {
  const lines = changes.map(formatChange);
  lines.push(rating === undefined ? "No change." : `${changes.length} changes, the worst ${rating}.`);
  if (rating !== undefined && proposedVersion !== undefined) lines.push(`Proposed next version: ${proposedVersion}`);
  return `${lines.join("\n")}\n`;
}

function formatChange(change: Change): string {
  const detail = change.detail === undefined ? "" : ` ${change.detail}`;
  const states = `${change.before ?? "–"} → ${change.after ?? "–"}`;
  return `${change.rating} ${change.kind} ${change.path}${detail}: ${states}\n    ${change.reason}${change.clause === "" ? "" : ` ${change.clause}`}`;
}
