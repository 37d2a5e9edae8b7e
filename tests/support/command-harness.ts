import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import type { Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { getValue, type Result } from "~/domain/core/result";
import { BlockAllocator } from "~/domain/editing/allocate-node-id";
import { createModel } from "~/domain/editing/commands/create-model";
import type { CommandContext, Edit } from "~/domain/editing/edit-draft";
import { expectOperations } from "./expect-operation";
import { getPublishedLayer, getStandardLayer } from "./published-layers";
import { TEST_NAMESPACE } from "./small-standard";

type Command<I> = (space: AddressSpace, context: CommandContext, intent: I) => Result<Edit>;

/** A model on published layers that commands edit; each edit is proved to have its inverse and JSON form. */
export class Workbench {
  space: AddressSpace;
  readonly context: BlockAllocator;

  constructor(...files: string[]) {
    const layers: Layer[] = [getStandardLayer(), ...files.map(getPublishedLayer)];
    this.context = new BlockAllocator(TEST_NAMESPACE, [{ from: 5001, to: 90_000 }]);
    const requiredModels = layers.flatMap((l) => l.header.models.slice(0, 1));
    const intent = {
      namespaceUri: TEST_NAMESPACE,
      version: "1.0.0",
      publicationDate: "2024-05-01T00:00:00Z",
      requiredModels,
    };
    const { header, nodes } = getValue(createModel(layers, this.context, intent));
    this.space = AddressSpace.of(layers, buildLayer(header, nodes));
  }

  /** Runs a command that must go through; answers the main node that it made, or the first of the own model. */
  do<I>(command: Command<I>, intent: I): NodeKey {
    const edit = getValue(command(this.space, this.context, intent));
    if (edit.operations.length > 0) this.space = expectOperations(this.space, edit.operations);
    return edit.made[0] ?? ("" as NodeKey);
  }

  /** The codes of a command that must be refused. */
  refuse<I>(command: Command<I>, intent: I): string[] {
    const result = command(this.space, this.context, intent);
    return result.ok ? ["went through"] : result.problems.map((p) => p.code);
  }

  node(key: NodeKey): Node {
    return this.space.requireNode(key);
  }

  /** The node at plain names below a node, by any hierarchical reference. */
  at(top: NodeKey, path: string): Node {
    let key = top;
    for (const name of path.split("/")) {
      const found = this.space
        .edgesFrom(key)
        .map((e) => this.space.getNode(e.target))
        .find((n) => n?.browseName.name === name);
      if (!found) throw new Error(`No ${name} of ${path}`);
      key = found.key;
    }
    return this.node(key);
  }

  has(top: NodeKey, path: string): boolean {
    try {
      this.at(top, path);
      return true;
    } catch {
      return false;
    }
  }
}
