/** Where the reader can stand, and what that place is called in leftovers. */
import type { Leaf } from "./leaf-reader";
import { joinPath, toStep } from "./leftover-path";
import type { ModelDraft } from "./header-builder";
import type { ReadContext } from "./read-context";

/** The name of the open element that decides what may follow. */
export type State =
  | "document"
  | "root"
  | "namespaces"
  | "servers"
  | "models"
  | "model"
  | "roles"
  | "aliases"
  | "extensions"
  | "node"
  | "references"
  | "definition"
  | "field"
  | "argument"
  | "leaf";

/** Elements that hold text only, by where they stand; InverseName is asked for its node's class besides. */
const LEAVES: Partial<Record<State, ReadonlyMap<string, Leaf>>> = {
  node: new Map<string, Leaf>([
    ["DisplayName", "displayName"],
    ["Description", "description"],
    ["Category", "category"],
    ["Documentation", "documentation"],
    ["InverseName", "inverseName"],
  ]),
  references: new Map<string, Leaf>([["Reference", "reference"]]),
  namespaces: new Map<string, Leaf>([["Uri", "uri"]]),
  servers: new Map<string, Leaf>([["Uri", "server"]]),
  aliases: new Map<string, Leaf>([["Alias", "alias"]]),
  roles: new Map<string, Leaf>([["RolePermission", "role"]]),
  field: new Map<string, Leaf>([
    ["DisplayName", "fieldDisplayName"],
    ["Description", "fieldDescription"],
  ]),
  argument: new Map<string, Leaf>([
    ["Name", "argumentName"],
    ["Description", "argumentDescription"],
  ]),
};

export function findLeaf(state: State, local: string): Leaf | undefined {
  return LEAVES[state]?.get(local);
}

const TABLES: Partial<Record<State, string>> = {
  namespaces: "NamespaceUris",
  servers: "ServerUris",
  models: "Models",
  roles: "RolePermissions",
  aliases: "Aliases",
  extensions: "Extensions",
  references: "References",
  definition: "Definition",
};

/** Whether the element has no object of its own that would keep its unknown attributes and elements. */
export function isTable(state: State): boolean {
  return state === "argument" || (state !== "definition" && TABLES[state] !== undefined);
}

/** The path of the innermost of the open elements that is no leaf, below its node or below the root. */
export function findPath(states: readonly State[], context: ReadContext): string {
  let path = "";
  let models = 0;
  for (const state of states) {
    const table = TABLES[state];
    if (state === "node") path = "";
    else if (table !== undefined) path = joinPath(path, table);
    else if (state === "model") path = joinPath(path, findModelStep(context, models++));
    else if (state === "field") path = joinPath(path, findFieldStep(context));
    else if (state === "argument") {
      path = joinPath(
        path,
        toStep("ArgumentDescription", undefined, (context.node?.argumentDescriptions?.length ?? 0) + 1),
      );
    }
  }
  return path;
}

function findFieldStep({ definition, field, siblings }: ReadContext): string {
  const name = field?.name ?? "";
  return toStep(
    "Field",
    name,
    siblings.count(definition?.fields ?? [], (one) => one.name, name),
  );
}

function findModelStep({ models, header, siblings }: ReadContext, index: number): string {
  const uri = models[index]?.modelUri ?? "";
  const above: readonly ModelDraft[] = index === 0 ? header.models : (models[index - 1]?.requiredModels ?? []);
  return toStep(index === 0 ? "Model" : "RequiredModel", uri, siblings.count(above, (one) => one.modelUri, uri) + 1);
}
