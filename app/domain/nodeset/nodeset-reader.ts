/**
 * The reader's state machine: which element may stand where, and what becomes of it. It is driven by `scanXml` and kept
 * free of per-node garbage, since a NodeSet has tens of thousands of references.
 */
import type { Node, XmlText } from "../address-space/node";
import { OPC_UA_NAMESPACE, type NodeKey } from "../address-space/node-id";
import type { LocalizedText } from "../address-space/qualified-name";
import { problem, type Place, type Problem, type Result } from "../core/result";
import {
  DEFINITION_ATTRIBUTES,
  FIELD_ATTRIBUTES,
  MODEL_ATTRIBUTES,
  NODE_ATTRIBUTES,
  type AttributeTable,
} from "./attribute-tables";
import { HeaderBuilder, type IdTables, type ModelDraft } from "./header-builder";
import { IdTable } from "./id-table";
import type { ReadLimits } from "./limits";
import { append, NodeBuilder, type DefinitionDraft, type FieldDraft } from "./node-builder";
import { NODE_ELEMENTS, NODESET_XML_NAMESPACE } from "./nodeset-xml";
import { ProblemList } from "./problem-list";
import { RawCapture, type CaptureMode } from "./raw-capture";
import { readAttributes, type AttributeContext } from "./read-attributes";
import type { NodeSetContent } from "./nodeset-content";
import { findRootMeaning } from "./root-meanings";
import { getLocalName, NamespaceScopes } from "./xml/namespace-scopes";
import { ScanStop, type AttributeHint, type Attributes, type XmlHandler } from "./xml/scan-xml";
import { PositionCounter, type Position } from "./xml/source-position";
import { StringCache } from "./xml/string-cache";

/** Where the reader stands; the name of the open element that decides what may follow. */
type State =
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

type Leaf =
  | "uri"
  | "server"
  | "alias"
  | "role"
  | "displayName"
  | "description"
  | "inverseName"
  | "category"
  | "documentation"
  | "reference"
  | "fieldDisplayName"
  | "fieldDescription"
  | "argumentName"
  | "argumentDescription";

const NO_ATTRIBUTES: readonly string[] = [];
const LOCALE = ["Locale"] as const;
const NODE_HANDLED = ["NodeId", "BrowseName"] as const;
const NAME_HANDLED = ["Name"] as const;
const MODEL_HANDLED = ["ModelUri"] as const;

export class NodeSetReader implements XmlHandler {
  readonly problems: ProblemList;
  /** Set when a table stood behind nodes: what the second pass must be given. */
  lateTables: IdTables | undefined;
  readonly #source: string;
  readonly #limits: ReadLimits;
  readonly #positions: PositionCounter;
  readonly #cache: StringCache;
  readonly #scopes = new NamespaceScopes();
  readonly #header: HeaderBuilder;
  readonly #states: State[] = ["document"];
  #state: State = "document";
  #rootDefaultUri = "";
  #hasFirstChild = false;
  #isInHeader = false;
  readonly #tables: IdTables | undefined;
  #ids: IdTable;
  #hasIds = false;
  #isLate = false;

  #capture: RawCapture | undefined;
  #captureInto: ((text: XmlText) => void) | undefined;
  #captureDepth = 0;

  #leaf: Leaf = "uri";
  #leafName = "";
  #leafAttributes: Attributes = {};
  #leafOffset = 0;
  #text = "";

  #node: NodeBuilder | undefined;
  #definition: DefinitionDraft | undefined;
  #fields: FieldDraft[] = [];
  #field: FieldDraft | undefined;
  #argumentName = "";
  #argumentDescription: LocalizedText[] = [];
  readonly #models: ModelDraft[] = [];

  readonly #nodes: Node[] = [];
  readonly #offsets = new Map<NodeKey, number>();
  readonly #attributeContext: AttributeContext;
  #elementOffset = 0;
  #isWhole = true;

  constructor(source: string, limits: ReadLimits, tables: IdTables | undefined) {
    this.#source = source;
    this.#limits = limits;
    this.#tables = tables;
    this.problems = new ProblemList(limits.maxProblems);
    this.#positions = new PositionCounter(source);
    this.#cache = new StringCache(source);
    this.#header = new HeaderBuilder((found, offset) => this.#report(found, offset));
    this.#ids = new IdTable([], [], new Map());
    this.#attributeContext = {
      toKey: (text, attribute) => this.#toKey(text, this.#elementOffset, attribute),
      reportValue: (attribute, value, expected) =>
        this.#report(problem("nodeset.attribute-value", { attribute, value, expected }), this.#elementOffset, attribute),
    };
  }

  finish(): NodeSetContent {
    this.#finishHeader();
    const header = this.#header.build(this.#ids);
    const source = this.#source;
    const offsets = this.#offsets;
    let lines: ReadonlyMap<NodeKey, Position> | undefined;
    return {
      header,
      nodes: this.#nodes,
      isWhole: this.#isWhole && !this.#header.hasLosses,
      // Counted when they are asked for: who loads a required model never asks.
      get lines() {
        return (lines ??= countLines(source, offsets));
      },
    };
  }

  /** Where the own model with this index is declared. */
  modelsAt(index: number): Place | undefined {
    const model = this.#header.models[index];
    return model && this.#positions.at(model.offset);
  }

  open(name: string, attributes: Attributes, start: number, end: number, hint: AttributeHint): void {
    const depth = this.#states.length + this.#captureDepth;
    if (hint === "declaring") this.#scopes.declare(depth, attributes);
    if (hint !== "plain") this.#requirePrefixes(attributes, start);
    if (this.#capture) {
      if (name.includes(":")) this.#requirePrefix(name, start);
      this.#captureDepth++;
      this.#capture.open(name, attributes, start, end, depth);
      return;
    }
    this.#elementOffset = start;
    const isPlain = !name.includes(":");
    if (!isPlain) this.#requirePrefix(name, start);
    const uri = isPlain ? this.#scopes.defaultUri : this.#scopes.uriOf(name);
    const local = isPlain ? name : getLocalName(name);
    if (this.#state === "document") {
      this.#openRoot(local, uri, attributes, start);
      return;
    }
    this.#hasFirstChild = true;
    const next = uri === NODESET_XML_NAMESPACE ? this.#openKnown(local, attributes, start, end) : undefined;
    if (next === undefined) this.#openUnknown(name, attributes, start, end);
    else if (next !== "captured") this.#push(next);
  }

  text(start: number, end: number, resolved: string | undefined): void {
    if (this.#capture) this.#capture.text(start, end, resolved);
    else if (this.#state === "leaf") {
      const piece = resolved ?? this.#cache.slice(start, end);
      this.#text = this.#text === "" ? piece : this.#text + piece;
    }
  }

  comment(text: string): void {
    if (!this.#hasFirstChild) this.#header.comments.push(text);
  }

  close(name: string, start: number, end: number): void {
    if (this.#capture) {
      this.#captureDepth--;
      if (this.#captureDepth > 0) {
        const depth = this.#states.length + this.#captureDepth;
        this.#capture.close(name, start, depth);
        this.#scopes.leave(depth);
        return;
      }
      const text = this.#capture.finish(start, end);
      const into = this.#captureInto;
      this.#capture = undefined;
      this.#scopes.leave(this.#states.length);
      into?.(text);
      return;
    }
    this.#closeState();
    this.#states.pop();
    this.#state = this.#states.at(-1) ?? "document";
    this.#scopes.leave(this.#states.length);
  }

  /** Names with prefixes that nobody declared mean nothing (Namespaces in XML 1.0 §5). */
  #requirePrefix(name: string, offset: number): void {
    const prefix = name.slice(0, name.indexOf(":"));
    if (prefix === "xmlns" || this.#scopes.find(prefix) !== undefined) return;
    throw new ScanStop(problem("xml.prefix-undeclared", { prefix, name }, this.#positions.at(offset)));
  }

  #requirePrefixes(attributes: Attributes, offset: number): void {
    for (const name in attributes) if (name.includes(":")) this.#requirePrefix(name, offset);
  }

  #push(state: State): void {
    this.#states.push(state);
    this.#state = state;
  }

  #openRoot(local: string, uri: string, attributes: Attributes, start: number): void {
    if (local !== "UANodeSet") {
      const what = findRootMeaning(local, uri);
      throw new ScanStop(problem("nodeset.wrong-root", { root: local, what }, this.#positions.at(start)));
    }
    if (uri !== NODESET_XML_NAMESPACE) {
      throw new ScanStop(problem("nodeset.wrong-namespace", { uri }, this.#positions.at(start)));
    }
    this.#header.rootAttributes = attributes;
    this.#rootDefaultUri = this.#scopes.defaultUri;
    this.#push("root");
  }

  /** The state after an element of the NodeSet's own XML namespace; undefined when it has no place here. */
  #openKnown(local: string, attributes: Attributes, start: number, end: number): State | "captured" | undefined {
    switch (this.#state) {
      case "root":
        return this.#openInRoot(local, attributes, start);
      case "node":
        return this.#openInNode(local, attributes, start, end);
      case "references":
        return local === "Reference" ? this.#openLeaf("reference", local, attributes, start) : undefined;
      case "namespaces":
        return local === "Uri" ? this.#openLeaf("uri", local, attributes, start) : undefined;
      case "servers":
        return local === "Uri" ? this.#openLeaf("server", local, attributes, start) : undefined;
      case "aliases":
        return local === "Alias" ? this.#openLeaf("alias", local, attributes, start) : undefined;
      case "roles":
        return local === "RolePermission" ? this.#openLeaf("role", local, attributes, start) : undefined;
      case "models":
        return local === "Model" ? this.#openModel(local, attributes, start) : undefined;
      case "model":
        return this.#openInModel(local, attributes, start);
      case "extensions":
        if (local !== "Extension") return undefined;
        return this.#openCapture("content", local, attributes, start, end, (text) => this.#addExtension(text));
      case "definition":
        return local === "Field" ? this.#openField(attributes, start) : undefined;
      case "field":
        if (local === "DisplayName") return this.#openLeaf("fieldDisplayName", local, attributes, start);
        return local === "Description" ? this.#openLeaf("fieldDescription", local, attributes, start) : undefined;
      case "argument":
        if (local === "Name") return this.#openLeaf("argumentName", local, attributes, start);
        return local === "Description" ? this.#openLeaf("argumentDescription", local, attributes, start) : undefined;
      default:
        return undefined;
    }
  }

  #openInRoot(local: string, attributes: Attributes, start: number): State | "captured" | undefined {
    const nodeClass = NODE_ELEMENTS.get(local);
    if (nodeClass !== undefined) {
      this.#finishHeader();
      return this.#openNode(local, nodeClass, attributes, start);
    }
    this.#isInHeader = true;
    switch (local) {
      case "NamespaceUris":
        this.#noteTable(local, start);
        return "namespaces";
      case "ServerUris":
        this.#noteTable(local, start);
        this.#header.hasServerUris = true;
        return "servers";
      case "Aliases":
        this.#noteTable(local, start);
        return "aliases";
      case "Models":
        return "models";
      case "Extensions":
        return "extensions";
      default:
        return undefined;
    }
  }

  #openInNode(
    local: string,
    attributes: Attributes,
    start: number,
    end: number,
  ): State | "captured" | undefined {
    const node = this.#node;
    if (!node) return undefined;
    const { nodeClass } = node.fields;
    switch (local) {
      case "DisplayName":
        return this.#openLeaf("displayName", local, attributes, start);
      case "Description":
        return this.#openLeaf("description", local, attributes, start);
      case "Category":
        return this.#openLeaf("category", local, attributes, start);
      case "Documentation":
        return this.#openLeaf("documentation", local, attributes, start);
      case "References":
        return "references";
      case "RolePermissions":
        node.rolePermissions ??= [];
        return "roles";
      case "Extensions":
        node.extensions ??= [];
        return "extensions";
      case "Value":
        if (nodeClass !== "Variable" && nodeClass !== "VariableType") return undefined;
        return this.#openCapture("value", local, attributes, start, end, (text) => (node.fields.value = text));
      case "Translation":
        if (nodeClass !== "Variable") return undefined;
        return this.#openCapture("content", local, attributes, start, end, (text) => (node.translations ??= []).push(text));
      case "ArgumentDescription":
        if (nodeClass !== "Method") return undefined;
        this.#argumentName = "";
        this.#argumentDescription = [];
        return "argument";
      case "Definition":
        return nodeClass === "DataType" ? this.#openDefinition(attributes, start) : undefined;
      case "InverseName":
        return nodeClass === "ReferenceType" ? this.#openLeaf("inverseName", local, attributes, start) : undefined;
      default:
        return undefined;
    }
  }

  #openLeaf(leaf: Leaf, name: string, attributes: Attributes, start: number): State {
    this.#leaf = leaf;
    this.#leafName = name;
    this.#leafAttributes = attributes;
    this.#leafOffset = start;
    this.#text = "";
    return "leaf";
  }

  #openCapture(
    mode: CaptureMode,
    name: string,
    attributes: Attributes,
    start: number,
    end: number,
    into: (text: XmlText) => void,
  ): "captured" {
    this.#capture = new RawCapture(
      this.#source,
      mode,
      { name, attributes, start, end, depth: this.#states.length },
      this.#scopes,
      this.#rootDefaultUri,
      this.#ids.namespaceUris,
      (found, offset) => this.#report(found, offset),
    );
    this.#captureInto = into;
    this.#captureDepth = 1;
    return "captured";
  }

  /** Keeps an element that the schema does not know, where there is a place for it; else says that it is not kept. */
  #openUnknown(name: string, attributes: Attributes, start: number, end: number): void {
    const into = this.#findPlaceForUnknown();
    if (!into) this.#report(problem.warning("nodeset.element-not-kept", { element: name }), start);
    this.#openCapture(into ? "whole" : "nothing", name, attributes, start, end, (text) => into?.push(text));
  }

  #findPlaceForUnknown(): XmlText[] | undefined {
    switch (this.#state) {
      case "root":
        return this.#header.otherElements;
      case "node":
        return this.#node && (this.#node.otherElements ??= []);
      case "model": {
        const model = this.#models.at(-1);
        return model && (model.otherElements ??= []);
      }
      case "definition":
        return this.#definition && othersOf(this.#definition);
      case "field":
        return this.#field && othersOf(this.#field);
      default:
        return undefined;
    }
  }

  #noteTable(element: string, start: number): void {
    if (!this.#hasIds) return;
    this.#report(problem.hint("nodeset.header-order", { element }), start);
    this.#isLate = true;
  }

  #finishHeader(): void {
    if (this.#isLate && !this.#tables) this.lateTables = this.#header.toIdTables();
    if (this.#hasIds) return;
    this.#hasIds = true;
    const tables = this.#tables ?? this.#header.toIdTables();
    this.#ids = new IdTable(tables.namespaceUris, tables.serverUris, tables.aliases);
  }

  #openModel(local: string, attributes: Attributes, start: number): State {
    const fields: Record<string, unknown> = {};
    const otherAttributes = readAttributes(attributes, MODEL_ATTRIBUTES, MODEL_HANDLED, fields, this.#attributeContext);
    const modelUri = attributes["ModelUri"];
    if (modelUri === undefined) this.#reportMissing(local, "ModelUri", start);
    this.#models.push({
      fields,
      modelUri: modelUri ?? "",
      offset: start,
      requiredModels: [],
      otherAttributes,
      roles: undefined,
      otherElements: undefined,
    });
    return "model";
  }

  #openInModel(local: string, attributes: Attributes, start: number): State | undefined {
    if (local === "RequiredModel") return this.#openModel(local, attributes, start);
    if (local !== "RolePermissions") return undefined;
    const model = this.#models.at(-1);
    if (model) model.roles ??= [];
    return "roles";
  }

  #openNode(element: string, nodeClass: Node["nodeClass"], attributes: Attributes, start: number): State | "captured" {
    if (this.#nodes.length >= this.#limits.maxNodes) {
      throw new ScanStop(problem("limit.nodes", { limit: this.#limits.maxNodes }, this.#positions.at(start)));
    }
    this.#isInHeader = false;
    this.#node = undefined;
    const idText = attributes["NodeId"];
    if (idText === undefined) this.#reportMissing(element, "NodeId", start);
    const nodeId = idText === undefined ? undefined : this.#take(this.#ids.parseOwn(idText), start, "NodeId");
    const nameText = attributes["BrowseName"];
    if (nameText === undefined) this.#reportMissing(element, "BrowseName", start);
    const browseName = this.#take(this.#ids.parseName(nameText ?? ""), start, "BrowseName") ?? {
      namespaceUri: OPC_UA_NAMESPACE,
      name: nameText ?? "",
    };
    if (nodeId === undefined) return this.#skipNode(element, attributes, start);
    const node = new NodeBuilder(start, nodeClass, nodeId, browseName, this.#nodes.length);
    const known = this.#offsets.get(node.key);
    if (known !== undefined || node.isNull()) {
      const data = { nodeId: node.nodeIdText, firstLine: known === undefined ? 0 : this.#positions.at(known).line };
      const code = known === undefined ? "nodeset.null-node-id" : "nodeset.duplicate-node-id";
      this.#report(problem(code, data), start, "NodeId");
      return this.#skipNode(element, attributes, start);
    }
    if (isDigit(browseName.name.charCodeAt(0)) && /^\d+:/.test(browseName.name)) {
      this.#report(problem.warning("nodeset.browse-name-prefix", { name: browseName.name }), start, "BrowseName");
    }
    this.#offsets.set(node.key, start);
    this.#node = node;
    const others = this.#readInto(attributes, NODE_ATTRIBUTES[nodeClass], NODE_HANDLED, node.fields);
    if (others) node.fields.otherAttributes = others;
    return "node";
  }

  /** A node without usable id cannot be kept; what is in it is passed over. */
  #skipNode(element: string, attributes: Attributes, start: number): "captured" {
    this.#isWhole = false;
    return this.#openCapture("nothing", element, attributes, start, start, () => undefined);
  }

  #openDefinition(attributes: Attributes, start: number): State {
    const text = attributes["Name"];
    if (text === undefined) this.#reportMissing("Definition", "Name", start);
    const name = this.#take(this.#ids.parseName(text ?? ""), start, "Name");
    const definition: DefinitionDraft = { name: name ?? { namespaceUri: OPC_UA_NAMESPACE, name: text ?? "" }, fields: [] };
    const others = this.#readInto(attributes, DEFINITION_ATTRIBUTES, NAME_HANDLED, definition);
    if (others) definition.otherAttributes = others;
    this.#fields = [];
    this.#definition = definition;
    return "definition";
  }

  #openField(attributes: Attributes, start: number): State {
    if (attributes["Name"] === undefined) this.#reportMissing("Field", "Name", start);
    const field: FieldDraft = { name: attributes["Name"] ?? "" };
    const others = this.#readInto(attributes, FIELD_ATTRIBUTES, NAME_HANDLED, field);
    if (others) field.otherAttributes = others;
    this.#field = field;
    this.#fields.push(field);
    return "field";
  }

  #readInto(
    attributes: Attributes,
    table: AttributeTable,
    handled: readonly string[],
    target: object,
  ): Readonly<Record<string, string>> | undefined {
    return readAttributes(attributes, table, handled, target as Record<string, unknown>, this.#attributeContext);
  }

  #closeState(): void {
    switch (this.#state) {
      case "leaf":
        this.#closeLeaf();
        break;
      case "node":
        if (this.#node) this.#nodes.push(this.#node.build());
        this.#node = undefined;
        break;
      case "definition":
        if (this.#definition) {
          this.#definition.fields = this.#fields;
          if (this.#node) this.#node.fields.definition = this.#definition;
        }
        this.#definition = undefined;
        break;
      case "field":
        this.#field = undefined;
        break;
      case "argument":
        if (this.#node) {
          const description = this.#argumentDescription;
          (this.#node.argumentDescriptions ??= []).push({ name: this.#argumentName, description });
        }
        break;
      case "model": {
        const model = this.#models.pop();
        const parent = this.#models.at(-1);
        if (model) (parent ? parent.requiredModels : this.#header.models).push(model);
        break;
      }
      case "root":
        this.#finishHeader();
        break;
      default:
        break;
    }
  }

  #closeLeaf(): void {
    const text = this.#text;
    switch (this.#leaf) {
      case "reference":
        this.#addReference(text);
        return;
      case "displayName":
        if (this.#node) this.#node.displayName = append(this.#node.displayName, this.#toLocalizedText(text));
        return;
      case "description":
        if (this.#node) this.#node.description = append(this.#node.description, this.#toLocalizedText(text));
        return;
      case "inverseName":
        if (this.#node) this.#node.inverseName = append(this.#node.inverseName, this.#toLocalizedText(text));
        return;
      case "category":
        if (this.#node) this.#node.category = append(this.#node.category, text);
        break;
      case "documentation":
        if (this.#node) this.#node.fields.documentation = text;
        break;
      case "fieldDisplayName":
        if (this.#field) this.#field.displayName = append(this.#field.displayName, this.#toLocalizedText(text));
        return;
      case "fieldDescription":
        if (this.#field) this.#field.description = append(this.#field.description, this.#toLocalizedText(text));
        return;
      case "argumentName":
        this.#argumentName = text;
        break;
      case "argumentDescription":
        this.#argumentDescription.push(this.#toLocalizedText(text));
        return;
      case "role":
        this.#addRole(text);
        return;
      case "alias":
        this.#addAlias(text);
        return;
      case "uri":
        this.#header.addNamespace(text.trim(), this.#leafOffset);
        break;
      case "server":
        this.#header.serverUris.push(text.trim());
        break;
    }
    this.#warnOfAttributes(NO_ATTRIBUTES);
  }

  #toLocalizedText(text: string): LocalizedText {
    const locale = this.#leafAttributes["Locale"];
    this.#warnOfAttributes(LOCALE);
    return locale === undefined ? { text } : { locale, text };
  }

  #addReference(text: string): void {
    const attributes = this.#leafAttributes;
    const typeText = attributes["ReferenceType"];
    if (typeText === undefined) this.#reportMissing("Reference", "ReferenceType", this.#leafOffset);
    const type = typeText === undefined ? undefined : this.#toKey(typeText, this.#leafOffset, "ReferenceType");
    const isForward = this.#readIsForward(attributes["IsForward"]);
    const known = this.#ids.findKnown(text);
    const target = known === undefined ? this.#take(this.#ids.resolveTarget(text), this.#leafOffset) : undefined;
    const key = known ?? target?.key;
    if (!this.#node) return;
    if (type === undefined || key === undefined) {
      this.#isWhole = false;
      return;
    }
    const others = this.#otherReferenceAttributes(attributes);
    const serverUri = target?.serverUri;
    if (others === undefined && serverUri === undefined) {
      this.#node.references.push({ type, target: key, isForward });
      return;
    }
    this.#node.references.push({
      type,
      target: key,
      isForward,
      ...(serverUri !== undefined ? { serverUri } : {}),
      ...(others ? { otherAttributes: others } : {}),
    });
  }

  #readIsForward(text: string | undefined): boolean {
    if (text === undefined || text === "true") return true;
    if (text === "false") return false;
    const trimmed = text.trim();
    if (trimmed === "false" || trimmed === "0") return false;
    if (trimmed !== "true" && trimmed !== "1") {
      const data = { attribute: "IsForward", value: text, expected: "true or false" };
      this.#report(problem("nodeset.attribute-value", data), this.#leafOffset, "IsForward");
    }
    return true;
  }

  #otherReferenceAttributes(attributes: Attributes): Record<string, string> | undefined {
    let others: Record<string, string> | undefined;
    for (const name in attributes) {
      if (name === "ReferenceType" || name === "IsForward" || name === "xmlns") continue;
      (others ??= {})[name] = attributes[name] ?? "";
    }
    return others;
  }

  #addRole(text: string): void {
    this.#warnOfAttributes(["Permissions"]);
    const permissions = Number(this.#leafAttributes["Permissions"] ?? "0");
    if (!(Number.isInteger(permissions) && permissions >= 0 && permissions <= 4_294_967_295)) {
      const value = this.#leafAttributes["Permissions"] ?? "";
      const data = { attribute: "Permissions", value, expected: "a whole number 0 … 4294967295" };
      this.#report(problem("nodeset.attribute-value", data), this.#leafOffset, "Permissions");
      this.#isWhole = false;
      return;
    }
    const model = this.#models.at(-1);
    if (model) {
      model.roles?.push({ text, permissions, offset: this.#leafOffset });
      return;
    }
    const role = this.#toKey(text, this.#leafOffset);
    if (role === undefined) this.#isWhole = false;
    else this.#node?.rolePermissions?.push({ role, permissions });
  }

  #addAlias(text: string): void {
    this.#warnOfAttributes(["Alias"]);
    const alias = this.#leafAttributes["Alias"];
    if (alias === undefined) this.#reportMissing("Alias", "Alias", this.#leafOffset);
    else this.#header.addAlias(alias, text.trim(), this.#leafOffset);
  }

  #addExtension(text: XmlText): void {
    if (this.#isInHeader) this.#header.extensions.push(text);
    else this.#node?.extensions?.push(text);
  }

  #toKey(text: string, offset: number, attribute?: string): NodeKey | undefined {
    return this.#ids.findKnown(text) ?? this.#take(this.#ids.resolve(text), offset, attribute);
  }

  #take<T>(result: Result<T>, offset: number, attribute?: string): T | undefined {
    for (const found of result.problems) this.#report(found, offset, attribute);
    return result.ok ? result.value : undefined;
  }

  #warnOfAttributes(known: readonly string[]): void {
    for (const attribute in this.#leafAttributes) {
      if (known.includes(attribute) || attribute.startsWith("xmlns")) continue;
      const data = { attribute, element: this.#leafName };
      this.#report(problem.warning("nodeset.attribute-not-kept", data), this.#leafOffset, attribute);
    }
  }

  #reportMissing(element: string, attribute: string, offset: number): void {
    this.#report(problem("nodeset.attribute-missing", { element, attribute }), offset, attribute);
  }

  #report(found: Problem, offset: number, attribute?: string): void {
    const node = this.#node?.nodeIdText;
    const at: Place = {
      ...this.#positions.at(offset),
      ...(node !== undefined ? { node } : {}),
      ...(attribute !== undefined ? { attribute } : {}),
    };
    this.problems.add({ ...found, at });
  }
}

function countLines(source: string, offsets: ReadonlyMap<NodeKey, number>): ReadonlyMap<NodeKey, Position> {
  const positions = new PositionCounter(source);
  return new Map([...offsets].map(([key, offset]) => [key, positions.at(offset)]));
}

function isDigit(code: number): boolean {
  return code >= 48 && code <= 57;
}

function othersOf(draft: { otherElements?: readonly XmlText[] }): XmlText[] {
  const list: XmlText[] = [...(draft.otherElements ?? [])];
  draft.otherElements = list;
  return list;
}
