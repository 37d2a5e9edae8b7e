/**
 * A roll-out: many machines of one type in one edit, each with its identification (OPC 40001-1 §8.2, §8.6). The type is not
 * touched. What a machine's type brings as Identification is filled; where it brings none the add-in is made.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findMember } from "../address-space/browse";
import { getOwnNamespace } from "../address-space/model-header";
import type { NodeClass } from "../address-space/node";
import { numericNodeId, toNodeKey, type NodeId, type NodeKey } from "../address-space/node-id";
import { StandardReferenceType } from "../address-space/standard-ids";
import { fail, problem, type Result } from "../core/result";
import type { NewNodePlace } from "../editing/allocate-node-id";
import { addObject } from "../editing/commands/add-member";
import { setValue } from "../editing/commands/set-value";
import type { CommandContext, Edit } from "../editing/edit-draft";
import { NodeIdLedger, PathAllocator } from "../editing/id-policies";
import { EditSequence } from "../editing/starters/edit-sequence";
import { DI_URI, MACHINERY_URI } from "../editing/starters/retrofit-models";
import { scalar, type Variant } from "../nodeset/values/variant";
import { addDeclaredMembers } from "./instantiate";

export type RollOutRow = {
  readonly name: string;
  readonly serialNumber: string;
  readonly location: string;
  /** Optional members of this machine, where it differs from the others. */
  readonly optional?: readonly string[];
};

/** As the model chooses its NodeIds, or string ids along the path below a name that a pattern gives the machine. */
export type NodeIdPolicy =
  | { readonly kind: "numbers" }
  | {
      readonly kind: "path";
      /** `{name}`, `{serial}` and `{place}` stand for the row's cells: `Hall.{name}`. */
      readonly pattern: string;
      readonly separator: string;
    };

export type RollOutIntent = {
  readonly type: NodeKey;
  /** The Machines object of OPC 40001-1, the Objects folder, or a folder of the own model. */
  readonly parent: NodeKey;
  /** Paths of optional members that every machine gets: `Process/PicksCounter`. */
  readonly optional: readonly string[];
  readonly manufacturer: string;
  readonly rows: readonly RollOutRow[];
  readonly nodeIds: NodeIdPolicy;
};

export const MACHINES = toNodeKey(numericNodeId(MACHINERY_URI, 1001));
const MACHINE_IDENTIFICATION = toNodeKey(numericNodeId(MACHINERY_URI, 1012));

/**
 * The machines come first in `made`, each before its members. Problems: those of `instantiate` and of `setValue`,
 * `roll-out.pattern`, `roll-out.node-id-taken`.
 */
export function rollOutMachines(
  space: AddressSpace,
  numbers: CommandContext,
  intent: RollOutIntent,
  ledger = new NodeIdLedger(),
): Result<Edit> {
  const { nodeIds, parent } = intent;
  if (nodeIds.kind === "path") {
    if (!/\{(name|serial)\}/.test(nodeIds.pattern)) return fail(problem("roll-out.pattern", { pattern: nodeIds.pattern }));
    const taken = findTakenId(space, nodeIds.pattern, intent.rows, ledger);
    if (taken !== undefined) return fail(problem("roll-out.node-id-taken", { nodeId: taken }));
  }
  const context = nodeIds.kind === "path" ? new MachineIds(space, parent, nodeIds, numbers, ledger) : numbers;
  const sequence = new EditSequence(space, context);
  for (const row of intent.rows) {
    if (context instanceof MachineIds) context.row = row;
    const machine = sequence.do((s, c) =>
      addObject(s, c, {
        parent: intent.parent,
        name: row.name,
        typeDefinition: intent.type,
        optional: row.optional ?? intent.optional,
      }),
    );
    if (machine === undefined) break;
    identify(sequence, machine, row, intent.manufacturer);
  }
  return sequence.finish();
}

/** The identifier that the pattern gives a machine. */
export function fillPattern(pattern: string, row: RollOutRow): string {
  const cells: Readonly<Record<string, string>> = { name: row.name, serial: row.serialNumber, place: row.location };
  return pattern.replace(/\{(name|serial|place)\}/g, (_, cell: string) => cells[cell] ?? "").trim();
}

/** The first id of the rows that the model has, or that two rows would share. */
function findTakenId(
  space: AddressSpace,
  pattern: string,
  rows: readonly RollOutRow[],
  ledger: NodeIdLedger,
): string | undefined {
  const namespaceUri = getOwnNamespace(space.own.header);
  const seen = new Set<string>();
  for (const row of rows) {
    const identifier = fillPattern(pattern, row);
    const nodeId: NodeId = { namespaceUri, type: "s", identifier };
    if (seen.has(identifier) || ledger.has(nodeId) || space.findByNodeId(nodeId)) return `s=${identifier}`;
    seen.add(identifier);
  }
  return undefined;
}

/** Gives the machine the id of the pattern, and what stands below it the path from there. */
class MachineIds implements CommandContext {
  row: RollOutRow | undefined;
  readonly #parent: NodeKey;
  readonly #pattern: string;
  readonly #paths: PathAllocator;

  constructor(
    space: AddressSpace,
    parent: NodeKey,
    policy: Extract<NodeIdPolicy, { kind: "path" }>,
    numbers: CommandContext,
    ledger: NodeIdLedger,
  ) {
    this.#parent = parent;
    this.#pattern = policy.pattern;
    this.#paths = new PathAllocator(getOwnNamespace(space.own.header), ledger, numbers, policy.separator);
  }

  allocate(nodeClass: NodeClass, place?: NewNodePlace): Result<NodeId> {
    if (!this.row || place?.parent !== this.#parent) return this.#paths.allocate(nodeClass, place);
    return this.#paths.allocate(nodeClass, { space: place.space, parent: undefined, name: fillPattern(this.#pattern, this.row) });
  }
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
