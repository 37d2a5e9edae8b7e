/** Several commands as one edit: each sees what the ones before it made. The first failure ends the sequence. */
import type { AddressSpace } from "../../address-space/address-space";
import type { NodeKey } from "../../address-space/node-id";
import { fail, ok, type Problem, type Result } from "../../core/result";
import { applyOperations } from "../apply-operation";
import type { CommandContext, Edit } from "../edit-draft";
import type { Operation } from "../operation";

export class EditSequence {
  readonly context: CommandContext;
  #space: AddressSpace;
  readonly #operations: Operation[] = [];
  readonly #made: NodeKey[] = [];
  #failure: readonly Problem[] | undefined;

  constructor(space: AddressSpace, context: CommandContext) {
    this.#space = space;
    this.context = context;
  }

  get space(): AddressSpace {
    return this.#space;
  }

  /** Does the command's edit; answers the main node that it made, undefined once something has failed. */
  do(command: (space: AddressSpace, context: CommandContext) => Result<Edit>): NodeKey | undefined {
    if (this.#failure) return undefined;
    const edit = command(this.#space, this.context);
    const applied = edit.ok ? applyOperations(this.#space, edit.value.operations) : edit;
    if (!edit.ok || !applied.ok) {
      this.#failure = applied.problems;
      return undefined;
    }
    this.#space = applied.value;
    this.#operations.push(...edit.value.operations);
    this.#made.push(...edit.value.made);
    return edit.value.made[0];
  }

  finish(): Result<Edit> {
    return this.#failure ? fail(...this.#failure) : ok({ operations: this.#operations, made: this.#made });
  }
}
