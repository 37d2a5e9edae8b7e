import { useMemo } from "react";
import type { MappingPart } from "~/domain/address-space/mapping-entry";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Result } from "~/domain/core/result";
import type { Operation } from "~/domain/editing/operation";
import { addRole, mapField, removeRole, renameRole } from "~/domain/mapping/commands";
import type { RowContent } from "~/domain/mapping/mapping";
import type { CheckCase, MappingPartValues, Role } from "~/domain/mapping/mapping-parts";
import { describe } from "../model/edit-steps";
import { useOpenModel, type OpenModel } from "../model/use-model";
import { showToast } from "../ui/toast";

export type FieldReference = { readonly role: string; readonly direction: "in" | "out"; readonly subindex: number };

/** Edits of a mapping: each is one transaction, so that undo takes it back and every window sees it. */
export class MappingActions {
  readonly blockedBy: string | undefined;
  readonly #model: OpenModel;
  readonly #owner: NodeKey;

  constructor(model: OpenModel, owner: NodeKey) {
    this.#model = model;
    this.#owner = owner;
    this.blockedBy = model.workspace.permissions.includes("mapping.edit")
      ? undefined
      : "asks for the role integrator, engineer or administrator";
  }

  setRow(id: string, row: RowContent): boolean {
    return this.set("map", "row", id, row);
  }

  removeRow(id: string): boolean {
    return this.set("unmap", "row", id, undefined);
  }

  /** A field dropped on a Variable: the command adds the unit conversion and says why. */
  mapField(target: string, reference: FieldReference): boolean {
    const { space } = this.#model.editor.getState();
    const mapped = mapField(space, this.#owner, target, reference);
    if (!mapped.ok) return this.#refuse(describe(space, mapped.problems));
    const isDone = this.dispatch("map", mapped.value.operations);
    const words = [...mapped.value.reasons, ...describe(space, mapped.problems)];
    if (isDone && words.length > 0) {
      showToast({
        tone: mapped.problems.length > 0 ? "warning" : "plain",
        title: "Mapped",
        detail: words.join(" "),
        seconds: 6,
      });
    }
    return isDone;
  }

  addRole(name: string, role: Role): boolean {
    const { space } = this.#model.editor.getState();
    return this.run("add-role", addRole(space, this.#owner, name, role));
  }

  setRole(name: string, role: Role): boolean {
    return this.set("set-role", "role", name, role);
  }

  renameRole(name: string, next: string): boolean {
    const { space } = this.#model.editor.getState();
    return this.run("rename-role", renameRole(space, this.#owner, name, next));
  }

  removeRole(name: string): boolean {
    const { space } = this.#model.editor.getState();
    return this.run("remove-role", removeRole(space, this.#owner, name));
  }

  setCase(id: string, value: CheckCase | undefined): boolean {
    return this.set(value ? "set-check-case" : "remove-check-case", "check-case", id, value);
  }

  set<P extends MappingPart>(label: string, part: P, id: string, value: MappingPartValues[P] | undefined): boolean {
    return this.dispatch(label, [
      { kind: "setMapping", part, owner: this.#owner, id, ...(value === undefined ? {} : { value }) },
    ]);
  }

  run(label: string, operations: Result<readonly Operation[]>): boolean {
    return operations.ok
      ? this.dispatch(label, operations.value)
      : this.#refuse(describe(this.#model.editor.getState().space, operations.problems));
  }

  dispatch(label: string, operations: readonly Operation[]): boolean {
    if (this.blockedBy !== undefined) return this.#refuse([`This ${this.blockedBy}.`]);
    if (operations.length === 0) return true;
    const result = this.#model.editor.dispatch(label, operations);
    return result.ok || this.#refuse(describe(this.#model.editor.getState().space, result.problems));
  }

  #refuse(reasons: readonly string[]): false {
    showToast({ tone: "error", title: "This cannot be done", detail: reasons.join(" "), seconds: 12 });
    return false;
  }
}

export function useMappingActions(owner: NodeKey): MappingActions {
  const model = useOpenModel();
  return useMemo(() => new MappingActions(model, owner), [model, owner]);
}
