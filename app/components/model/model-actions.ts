/** What people do to the open model: intents become commands, commands become one transaction each, refusals become messages. */
import type { Edge } from "~/domain/address-space/address-space";
import { findParent } from "~/domain/address-space/browse";
import type { NodeKey } from "~/domain/address-space/node-id";
import { addMethod, addObject, addProperty, addVariable, type AddMethodIntent, type AddObjectIntent, type AddPropertyIntent, type AddVariableIntent } from "~/domain/editing/commands/add-member";
import { addType, type AddTypeIntent } from "~/domain/editing/commands/add-type";
import { connectNodes, disconnectNodes, type ConnectNodesIntent } from "~/domain/editing/commands/connect-nodes";
import { deleteNodes, findDeletion } from "~/domain/editing/commands/delete-nodes";
import { moveNode } from "~/domain/editing/commands/move-node";
import { setAttribute, type SetAttributeIntent } from "~/domain/editing/commands/set-attribute";
import { setDataType } from "~/domain/editing/commands/set-data-type";
import { setMethodArguments } from "~/domain/editing/commands/set-method-arguments";
import { setText, type SetTextIntent } from "~/domain/editing/commands/set-text";
import { setUnit } from "~/domain/editing/commands/set-unit";
import { applyConsequences, touchesDeclarations, type Consequence } from "~/domain/instantiation/consequences";
import { addDeclaredMembers } from "~/domain/instantiation/instantiate";
import type { EditorStore } from "~/editor/editor-store";
import { showToast } from "../ui/toast";
import type { UnitFacts } from "./analog-facts";
import type { CellChange } from "./cell-change";
import { toCellStep } from "./cell-steps";
import { copySubtrees, readClipboard, writeClipboard } from "./copy-nodes";
import { composeEdit, describe, type EditStep } from "./edit-steps";
import { offerToFollow } from "./offer-to-follow";
import { listArguments, type ArgumentFacts, type Direction } from "./method-arguments";
import { getNodeName } from "./member-facts";
import { toRenameStep } from "./rename-steps";
import { setTypeDefinition } from "./set-type-definition";
import { namesUnit } from "./number-with-unit";
import { hasUnits, loadUnits } from "./unit-lookup";
import type { ViewStore } from "./view-store";

export class ModelActions {
  readonly canEdit: boolean;
  readonly #editor: EditorStore;
  readonly #view: ViewStore;

  constructor(editor: EditorStore, view: ViewStore, canEdit: boolean) {
    this.#editor = editor;
    this.#view = view;
    this.canEdit = canEdit;
  }

  mayChange(key: NodeKey): boolean {
    return this.canEdit && this.#editor.getState().space.isOwn(key);
  }

  mayRemoveReference(edge: Edge): boolean {
    return this.mayChange(edge.source) || this.mayChange(edge.target);
  }

  /** Answers the nodes that were made, undefined when the edit was refused; the refusal is then on screen. */
  #run(label: string, steps: readonly EditStep[]): readonly NodeKey[] | undefined {
    if (!this.canEdit || steps.length === 0) return undefined;
    const { space } = this.#editor.getState();
    const edit = composeEdit(space, this.#editor.allocator, steps);
    if (!edit.ok) return this.#refuse(edit.reasons);
    for (const note of edit.notes) showToast({ tone: "plain", title: note, seconds: 5 });
    if (edit.operations.length === 0) return edit.made;
    const result = this.#editor.dispatch(label, edit.operations);
    if (!result.ok) return this.#refuse(describe(space, result.problems));
    if (touchesDeclarations(space, edit.operations)) {
      offerToFollow(space, result.value, (consequences) => this.#follow(consequences));
    }
    return edit.made;
  }

  /** A command of a form of its own as one transaction. Answers the nodes that it made, undefined when it was refused. */
  apply(label: string, ...steps: readonly EditStep[]): readonly NodeKey[] | undefined {
    return this.#run(label, steps);
  }

  /** Brings copies in line with what they were made from. */
  #follow(consequences: readonly Consequence[]): void {
    this.#run("follow-type", [(space, context) => applyConsequences(space, context, { consequences })]);
  }

  #refuse(reasons: readonly string[]): undefined {
    const [first = "This edit is not possible.", ...more] = reasons;
    showToast({ tone: "error", title: first, ...(more.length > 0 ? { detail: more.join(" ") } : {}), seconds: 12 });
    return undefined;
  }

  #add(label: string, step: EditStep): NodeKey | undefined {
    const [key] = this.#run(label, [step]) ?? [];
    if (key !== undefined) this.#view.reveal(key);
    return key;
  }

  addObject(intent: AddObjectIntent): NodeKey | undefined {
    return this.#add("add-object", (space, context) => addObject(space, context, intent));
  }

  addVariable(intent: AddVariableIntent): NodeKey | undefined {
    return this.#add("add-variable", (space, context) => addVariable(space, context, intent));
  }

  addProperty(intent: AddPropertyIntent): NodeKey | undefined {
    return this.#add("add-property", (space, context) => addProperty(space, context, intent));
  }

  addMethod(intent: AddMethodIntent): NodeKey | undefined {
    return this.#add("add-method", (space, context) => addMethod(space, context, intent));
  }

  addType(intent: AddTypeIntent): NodeKey | undefined {
    return this.#add("add-type", (space, context) => addType(space, context, intent));
  }

  addOptionalMembers(instance: NodeKey, optional: readonly string[]): void {
    this.#run("add-optional-members", [(space, context) => addDeclaredMembers(space, context, { instance, optional })]);
  }

  addMissingMembers(instance: NodeKey): void {
    this.#run("add-missing-members", [(space, context) => addDeclaredMembers(space, context, { instance, includeMissing: true })]);
  }

  rename(node: NodeKey, name: string): void {
    this.#run("rename", [toRenameStep(node, name)]);
  }

  move(nodes: readonly NodeKey[], parent: NodeKey): void {
    this.#run("move", nodes.map((node) => (space, context) => moveNode(space, context, { node, parent })));
  }

  /** Deletes with all below; undo brings everything back, so it asks nothing. */
  remove(keys: readonly NodeKey[]): void {
    const nodes = keys.filter((key) => this.mayChange(key));
    if (nodes.length === 0) return;
    const { space } = this.#editor.getState();
    const count = findDeletion(space, nodes).nodes.length;
    const name = getNodeName(space, nodes[0]);
    const owner = nodes[0] && findParent(space, nodes[0]);
    if (this.#run("delete", [(current, context) => deleteNodes(current, context, { nodes })]) === undefined) return;
    this.#view.select(owner !== undefined && this.#editor.getState().space.getNode(owner) ? [owner] : []);
    const more = count > 1 ? ` and ${count - 1} ${count === 2 ? "node" : "nodes"} with it` : "";
    showToast({ tone: "plain", title: `${name}${more} deleted. Ctrl Z brings ${count > 1 ? "them" : "it"} back.`, seconds: 5 });
  }

  connect(intent: ConnectNodesIntent): void {
    this.#run("connect", [(space, context) => connectNodes(space, context, intent)]);
  }

  removeReference(edge: Edge): boolean {
    return this.#run("disconnect", [(space, context) => disconnectNodes(space, context, edge)]) !== undefined;
  }

  setUnit(variables: readonly NodeKey[], unit: UnitFacts | undefined): void {
    this.#run("set-unit", variables.map((variable) => (space, context) => setUnit(space, context, unit ? { variable, unit: unit.information } : { variable })));
  }

  setDataType(nodes: readonly NodeKey[], dataType: NodeKey): void {
    this.#run("set-data-type", nodes.map((node) => (space, context) => setDataType(space, context, { node, dataType })));
  }

  setTypeDefinition(nodes: readonly NodeKey[], type: NodeKey): void {
    this.#run("set-type", nodes.map((node) => (space, context) => setTypeDefinition(space, context, { node, type })));
  }

  setAttribute(nodes: readonly NodeKey[], attribute: SetAttributeIntent["attribute"], value: unknown): void {
    const part = value === undefined ? {} : { value };
    this.#run(`set-${attribute}`, nodes.map((node) => (space, context) => setAttribute(space, context, { node, attribute, ...part })));
  }

  setText(intent: SetTextIntent): void {
    this.#run(`set-${intent.attribute}`, [(space, context) => setText(space, context, intent)]);
  }

  setArguments(method: NodeKey, direction: Direction, list: readonly ArgumentFacts[]): void {
    const { space } = this.#editor.getState();
    const lists = { input: listArguments(space, method, "input"), output: listArguments(space, method, "output"), [direction]: list };
    const toIntent = ({ description, ...argument }: ArgumentFacts) => ({ ...argument, ...(description === "" ? {} : { description: { text: description } }) });
    const intent = { method, input: lists.input.map(toIntent), output: lists.output.map(toIntent) };
    this.#run("set-arguments", [(current, context) => setMethodArguments(current, context, intent)]);
  }

  /** Cells of own nodes; those of required models and columns that are read are left out. */
  changeCells(changes: readonly CellChange[], label: string): void {
    if (!hasUnits() && changes.some(namesUnit)) {
      void loadUnits().then(() => this.changeCells(changes, label));
      return;
    }
    const steps = changes.flatMap((change) => (this.mayChange(change.key) ? (toCellStep(change) ?? []) : []));
    this.#run(label, steps);
  }

  /** Texts found and replaced, in one edit; false when it was refused. */
  replaceTexts(steps: readonly EditStep[], count: number): boolean {
    if (this.#run("replace-texts", steps) === undefined) return false;
    showToast({ tone: "good", title: `Replaced in ${count} ${count === 1 ? "place" : "places"}. Ctrl Z takes all of it back.`, seconds: 6 });
    return true;
  }

  copyNodes(keys: readonly NodeKey[]): void {
    writeClipboard(this.#editor.getState().space, keys);
  }

  /** Copies what was copied last, here or in another model, below the parent. */
  paste(parent: NodeKey | undefined): void {
    const clipboard = readClipboard();
    if (!clipboard) return;
    const made = this.#run("paste", [(space, context) => copySubtrees(space, context, clipboard, parent)]);
    if (made && made.length > 0) this.#view.select(made.slice(0, 1));
  }

  duplicate(keys: readonly NodeKey[]): void {
    const { space } = this.#editor.getState();
    const clipboard = writeClipboard(space, keys.filter((key) => this.mayChange(key)));
    if (!clipboard) return;
    const made = this.#run("duplicate", [(current, context) => copySubtrees(current, context, clipboard, undefined)]);
    if (made?.[0] !== undefined) this.#view.reveal(made[0]);
  }

  undo(): void {
    const result = this.#editor.undo();
    if (!result.ok) this.#refuse(describe(this.#editor.getState().space, result.problems));
  }

  redo(): void {
    const result = this.#editor.redo();
    if (!result.ok) this.#refuse(describe(this.#editor.getState().space, result.problems));
  }
}
