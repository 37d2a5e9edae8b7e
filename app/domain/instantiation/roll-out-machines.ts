/**
 * A roll-out: many machines of one type in one edit, each with its identification (OPC 40001-1 §8.2, §8.6). The type is not
 * touched. What a machine's type brings as Identification is filled; where it brings none the add-in is made.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findMember } from "../address-space/browse";
import { numericNodeId, toNodeKey, type NodeKey } from "../address-space/node-id";
import { StandardReferenceType } from "../address-space/standard-ids";
import type { Result } from "../core/result";
import { addObject } from "../editing/commands/add-member";
import { setValue } from "../editing/commands/set-value";
import type { CommandContext, Edit } from "../editing/edit-draft";
import { EditSequence } from "../editing/starters/edit-sequence";
import { DI_URI, MACHINERY_URI } from "../editing/starters/retrofit-models";
import { scalar, type Variant } from "../nodeset/values/variant";
import { addDeclaredMembers } from "./instantiate";

export type RollOutRow = { readonly name: string; readonly serialNumber: string; readonly location: string };

export type RollOutIntent = {
  readonly type: NodeKey;
  /** The Machines object of OPC 40001-1, the Objects folder, or a folder of the own model. */
  readonly parent: NodeKey;
  /** Paths of optional members that every machine gets: `Process/PicksCounter`. */
  readonly optional: readonly string[];
  readonly manufacturer: string;
  readonly rows: readonly RollOutRow[];
};

export const MACHINES = toNodeKey(numericNodeId(MACHINERY_URI, 1001));
const MACHINE_IDENTIFICATION = toNodeKey(numericNodeId(MACHINERY_URI, 1012));

/** The machines come first in `made`, each before its members. Problems: those of `instantiate` and of `setValue`. */
export function rollOutMachines(space: AddressSpace, context: CommandContext, intent: RollOutIntent): Result<Edit> {
  const sequence = new EditSequence(space, context);
  for (const row of intent.rows) {
    const machine = sequence.do((s, c) =>
      addObject(s, c, {
        parent: intent.parent,
        name: row.name,
        typeDefinition: intent.type,
        optional: intent.optional,
      }),
    );
    if (machine === undefined) break;
    identify(sequence, machine, row, intent.manufacturer);
  }
  return sequence.finish();
}

function identify(sequence: EditSequence, machine: NodeKey, row: RollOutRow, manufacturer: string): void {
  if (!sequence.space.getNode(MACHINE_IDENTIFICATION)) return;
  const optional = row.location === "" ? [] : ["Location"];
  const there = findMember(sequence.space, machine, "Identification", DI_URI);
  const key =
    there?.key ??
    sequence.do((s, c) =>
      addObject(s, c, {
        parent: machine,
        name: "Identification",
        namespaceUri: DI_URI,
        typeDefinition: MACHINE_IDENTIFICATION,
        referenceType: StandardReferenceType.HasAddIn,
        optional,
      }),
    );
  if (key === undefined) return;
  if (there && optional.length > 0) sequence.do((s, c) => addDeclaredMembers(s, c, { instance: key, optional }));
  set(sequence, key, "SerialNumber", row.serialNumber === "" ? undefined : scalar("String", row.serialNumber));
  set(sequence, key, "Manufacturer", manufacturer === "" ? undefined : scalar("LocalizedText", { text: manufacturer }));
  set(sequence, key, "Location", row.location === "" ? undefined : scalar("String", row.location));
}

/** Sets a Property of the identification, where it has one of that name. */
function set(sequence: EditSequence, identification: NodeKey, name: string, value: Variant | undefined): void {
  if (!value) return;
  const node = [DI_URI, MACHINERY_URI]
    .map((uri) => findMember(sequence.space, identification, name, uri))
    .find((found) => found !== undefined);
  if (node) sequence.do((s, c) => setValue(s, c, { node: node.key, value }));
}

/** `B6` → `B7`, `Press 09` → `Press 10`: the next name of a row of machines; a name without a figure gets a 2. */
export function proposeNextName(name: string): string {
  const match = /^(.*?)(\d+)$/.exec(name.trim());
  if (!match) return name.trim() === "" ? "M1" : `${name.trim()}2`;
  const [, before = "", digits = ""] = match;
  return before + String(Number(digits) + 1).padStart(digits.length, "0");
}
