/** Collects the head of a file while it is read; ids are resolved at the end, since tables may come in any order. */
import { OPC_UA_NAMESPACE, type NodeKey } from "../address-space/node-id";
import type { ModelEntry, ModelHeader } from "../address-space/model-header";
import type { RolePermission, XmlText } from "../address-space/node";
import { problem, type Problem } from "../core/result";
import type { IdTable } from "./id-table";
import { LeftoverBuilder } from "./leftover-builder";
import type { Attributes } from "./xml/scan-xml";
import type { Position } from "./xml/source-position";

type PendingRole = { readonly text: string; readonly permissions: number; readonly offset: number };

/** A Model or RequiredModel that is being read. */
export type ModelDraft = {
  readonly fields: Record<string, unknown>;
  readonly modelUri: string;
  readonly offset: number;
  readonly requiredModels: ModelDraft[];
  readonly otherAttributes: Readonly<Record<string, string>> | undefined;
  roles: PendingRole[] | undefined;
  otherElements: XmlText[] | undefined;
};

/** The tables that ids depend on: what a second pass must know before the first node. */
export type IdTables = {
  readonly namespaceUris: readonly string[];
  readonly serverUris: readonly string[];
  readonly aliases: ReadonlyMap<string, string>;
};

type Report = (found: Problem, offset: number) => void;

export class HeaderBuilder {
  readonly namespaceUris: string[] = [];
  readonly serverUris: string[] = [];
  readonly aliases = new Map<string, { text: string; offset: number }>();
  readonly models: ModelDraft[] = [];
  readonly comments: string[] = [];
  readonly extensions: XmlText[] = [];
  readonly otherElements: XmlText[] = [];
  readonly leftovers = new LeftoverBuilder();
  rootAttributes: Attributes = {};
  hasServerUris = false;
  /** Set by `build` when an alias or a role could not be resolved. */
  hasLosses = false;
  readonly #report: Report;

  constructor(report: Report) {
    this.#report = report;
  }

  addNamespace(uri: string, offset: number): void {
    if (uri === OPC_UA_NAMESPACE) {
      const index = this.namespaceUris.length + 1;
      this.#report(problem.warning("nodeset.namespace-zero-listed", { uri, index }), offset);
    } else if (this.namespaceUris.includes(uri)) {
      this.#report(problem.warning("nodeset.namespace-listed-twice", { uri }), offset);
    }
    this.namespaceUris.push(uri);
  }

  addAlias(alias: string, text: string, offset: number): void {
    const known = this.aliases.get(alias);
    if (known === undefined) this.aliases.set(alias, { text, offset });
    else if (known.text !== text) this.#report(problem.warning("nodeset.alias-defined-twice", { alias }), offset);
  }

  toIdTables(): IdTables {
    return {
      namespaceUris: this.namespaceUris,
      serverUris: this.serverUris,
      aliases: new Map([...this.aliases].map(([alias, { text }]) => [alias, text])),
    };
  }

  /** Where each model, own or required, is named first. */
  listModelPlaces(at: (offset: number) => Position): ReadonlyMap<string, Position> {
    const places = new Map<string, Position>();
    const note = (model: ModelDraft): void => {
      if (!places.has(model.modelUri)) places.set(model.modelUri, at(model.offset));
      model.requiredModels.forEach(note);
    };
    this.models.forEach(note);
    return places;
  }

  build(ids: IdTable): ModelHeader {
    const { lastModified, others } = this.#splitRootAttributes();
    const leftovers = this.leftovers.build();
    return {
      namespaceUris: this.namespaceUris,
      ...(this.hasServerUris ? { serverUris: this.serverUris } : {}),
      models: this.models.map((model) => this.#toEntry(model, ids, [])),
      aliases: this.#resolveAliases(ids),
      ...(this.extensions.length > 0 ? { extensions: this.extensions } : {}),
      ...(lastModified !== undefined ? { lastModified } : {}),
      ...(this.comments.length > 0 ? { headComments: this.comments } : {}),
      rootAttributes: others,
      ...(this.otherElements.length > 0 ? { otherElements: this.otherElements } : {}),
      ...(leftovers ? { leftovers } : {}),
    };
  }

  #splitRootAttributes(): { lastModified: string | undefined; others: Record<string, string> } {
    const others: Record<string, string> = {};
    for (const name in this.rootAttributes) {
      if (name !== "LastModified") others[name] = this.rootAttributes[name] ?? "";
    }
    return { lastModified: this.rootAttributes["LastModified"], others };
  }

  #resolveAliases(ids: IdTable): (readonly [string, NodeKey])[] {
    const resolved: (readonly [string, NodeKey])[] = [];
    for (const [alias, { offset }] of this.aliases) {
      const result = ids.resolve(alias);
      for (const found of result.problems) this.#report(found, offset);
      if (result.ok) resolved.push([alias, result.value]);
      else this.hasLosses = true;
    }
    return resolved;
  }

  #toEntry(draft: ModelDraft, ids: IdTable, above: readonly string[]): ModelEntry {
    const path = [...above, draft.modelUri];
    if (above.includes(draft.modelUri)) {
      const data = { modelUri: draft.modelUri, path: path.join(" → ") };
      this.#report(problem("nodeset.required-model-cycle", data), draft.offset);
    }
    const roles = draft.roles?.flatMap((role) => this.#toRole(role, ids));
    return {
      modelUri: draft.modelUri,
      ...draft.fields,
      ...(roles ? { rolePermissions: roles } : {}),
      requiredModels: draft.requiredModels.map((required) => this.#toEntry(required, ids, path)),
      ...(draft.otherAttributes ? { otherAttributes: draft.otherAttributes } : {}),
      ...(draft.otherElements ? { otherElements: draft.otherElements } : {}),
    };
  }

  #toRole(role: PendingRole, ids: IdTable): RolePermission[] {
    const result = ids.resolve(role.text);
    for (const found of result.problems) this.#report(found, role.offset);
    if (!result.ok) this.hasLosses = true;
    return result.ok ? [{ role: result.value, permissions: role.permissions }] : [];
  }
}
