/**
 * The reader's state machine: which element may stand where. It is driven by `scanXml`; texts go to the leaf reader, raw
 * parts to a capture, and the drafts of what is open stand in the context.
 */
import type { Node, XmlText } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { problem, type Place } from "../core/result";
import type { IdTables } from "./header-builder";
import { IdTable } from "./id-table";
import { LeafReader } from "./leaf-reader";
import { LeftoverNotes } from "./leftover-notes";
import type { ReadLimits } from "./limits";
import type { NodeSetContent } from "./nodeset-content";
import { NODE_ELEMENTS, NODESET_XML_NAMESPACE } from "./nodeset-xml";
import { openDefinition, openField, openModel, openNode } from "./open-elements";
import { OpenCapture } from "./open-capture";
import type { ProblemList } from "./problem-list";
import type { CaptureMode } from "./raw-capture";
import { othersOf, ReadContext } from "./read-context";
import { findLeaf, isTable, type State } from "./reader-states";
import { findRootMeaning } from "./root-meanings";
import { getLocalName, NamespaceScopes } from "./xml/namespace-scopes";
import { ScanStop, type AttributeHint, type Attributes, type XmlHandler } from "./xml/scan-xml";
import { toPositions, type Position } from "./xml/source-position";

/** What follows an element: a state, or "captured" when it is kept raw or passed over. */
type Next = State | "captured";

export class NodeSetReader implements XmlHandler {
  /** Set when a table stood behind nodes: what the second pass must be given. */
  lateTables: IdTables | undefined;
  readonly #context: ReadContext;
  readonly #leaf: LeafReader;
  readonly #scopes = new NamespaceScopes();
  readonly #states: State[] = ["document"];
  #state: State = "document";
  #rootDefaultUri = "";
  #hasRoot = false;
  #isInHeader = false;
  readonly #tables: IdTables | undefined;
  #hasIds = false;
  #isLate = false;
  readonly #capture: OpenCapture;
  readonly #notes: LeftoverNotes;
  readonly #nodes: Node[] = [];
  readonly #offsets = new Map<NodeKey, number>();

  constructor(source: string, limits: ReadLimits, tables: IdTables | undefined) {
    this.#context = new ReadContext(source, limits);
    this.#leaf = new LeafReader(this.#context);
    this.#capture = new OpenCapture(this.#context, this.#scopes);
    this.#notes = new LeftoverNotes(this.#context, this.#states);
    this.#tables = tables;
  }

  get problems(): ProblemList {
    return this.#context.problems;
  }

  finish(): NodeSetContent {
    this.#finishHeader();
    this.#notes.finish();
    const { header, ids, source, isWhole } = this.#context;
    const built = header.build(ids);
    const offsets = this.#offsets;
    let lines: ReadonlyMap<NodeKey, Position> | undefined;
    return {
      header: built,
      nodes: this.#nodes,
      modelPlaces: header.listModelPlaces((offset) => this.#context.at(offset)),
      isWhole: isWhole && !header.hasLosses,
      // Counted when they are asked for: who loads a required model never asks.
      get lines() {
        return (lines ??= toPositions(source, offsets));
      },
    };
  }

  /** Where the own model with this index is declared. */
  modelsAt(index: number): Place | undefined {
    const model = this.#context.header.models[index];
    return model && this.#context.at(model.offset);
  }

  open(name: string, attributes: Attributes, start: number, end: number, hint: AttributeHint): void {
    const depth = this.#states.length + this.#capture.depth;
    if (hint === "declaring") this.#scopes.declare(depth, attributes);
    if (hint !== "plain") for (const attribute in attributes) this.#requirePrefix(attribute, start);
    const isPlain = !name.includes(":");
    if (!isPlain) this.#requirePrefix(name, start);
    if (this.#capture.depth > 0) {
      this.#capture.open(name, attributes, start, end, depth);
      return;
    }
    const uri = isPlain ? this.#scopes.defaultUri : this.#scopes.uriOf(name);
    const local = isPlain ? name : getLocalName(name);
    if (this.#state === "document") {
      this.#openRoot(local, uri, attributes, start);
      return;
    }
    const next = uri === NODESET_XML_NAMESPACE ? this.#openKnown(local, attributes, start, end) : undefined;
    if (next === undefined) this.#openUnknown(name, attributes, start, end);
    else if (next !== "captured") {
      this.#push(next);
      this.#notes.open(next, attributes);
    }
  }

  text(start: number, end: number, resolved: string | undefined): void {
    if (this.#capture.depth > 0) this.#capture.text(start, end, resolved);
    else if (this.#state === "leaf") this.#leaf.text(start, end, resolved);
    else this.#notes.text(start, end);
  }

  mark(start: number, end: number): void {
    if (this.#capture.depth > 0) return;
    const isInHead = this.#states.length === 1 && !this.#hasRoot;
    if (isInHead && this.#context.source.startsWith("<!--", start)) {
      this.#context.header.comments.push(this.#context.source.slice(start + 4, end - 3));
    } else this.#notes.mark(start, end);
  }

  close(name: string, start: number, end: number): void {
    if (this.#capture.depth > 0) {
      this.#capture.close(name, start, end, this.#states.length);
      return;
    }
    if (this.#state === "leaf") {
      this.#leaf.close();
      this.#notes.closeLeaf(this.#leaf);
    } else {
      this.#notes.close();
      this.#closeState();
    }
    this.#states.pop();
    this.#state = this.#states.at(-1) ?? "document";
    this.#scopes.leave(this.#states.length);
  }

  #requirePrefix(name: string, offset: number): void {
    const prefix = this.#scopes.findUndeclaredPrefix(name);
    if (prefix === undefined) return;
    throw new ScanStop(problem("xml.prefix-undeclared", { prefix, name }, this.#context.at(offset)));
  }

  #push(state: State): void {
    this.#states.push(state);
    this.#state = state;
  }

  #openRoot(local: string, uri: string, attributes: Attributes, start: number): void {
    const at = this.#context.at(start);
    if (local !== "UANodeSet") {
      throw new ScanStop(problem("nodeset.wrong-root", { root: local, what: findRootMeaning(local, uri) }, at));
    }
    if (uri !== NODESET_XML_NAMESPACE) throw new ScanStop(problem("nodeset.wrong-namespace", { uri }, at));
    this.#context.header.rootAttributes = attributes;
    this.#rootDefaultUri = this.#scopes.defaultUri;
    this.#hasRoot = true;
    this.#push("root");
    this.#notes.open("root", attributes);
  }

  /** What follows an element of the NodeSet's own XML namespace; undefined when it has no place here. */
  #openKnown(local: string, attributes: Attributes, start: number, end: number): Next | undefined {
    const leaf = findLeaf(this.#state, local);
    if (leaf !== undefined) {
      if (leaf === "inverseName" && this.#context.node?.fields.nodeClass !== "ReferenceType") return undefined;
      this.#leaf.open(leaf, local, attributes, start);
      return "leaf";
    }
    switch (this.#state) {
      case "root":
        return this.#openInRoot(local, attributes, start);
      case "node":
        return this.#openInNode(local, attributes, start, end);
      case "models":
      case "model":
        return this.#openInModels(local, attributes, start);
      case "extensions":
        if (local !== "Extension") return undefined;
        return this.#openCapture("content", local, attributes, start, end, (text) => this.#addExtension(text));
      case "definition":
        if (local !== "Field") return undefined;
        openField(this.#context, attributes, start);
        return "field";
      default:
        return undefined;
    }
  }

  #openInRoot(local: string, attributes: Attributes, start: number): Next | undefined {
    const nodeClass = NODE_ELEMENTS.get(local);
    if (nodeClass !== undefined) return this.#openNode(local, nodeClass, attributes, start);
    this.#isInHeader = true;
    switch (local) {
      case "NamespaceUris":
        this.#noteTable(local, start);
        return "namespaces";
      case "ServerUris":
        this.#noteTable(local, start);
        this.#context.header.hasServerUris = true;
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

  #openNode(name: string, nodeClass: Node["nodeClass"], attributes: Attributes, start: number): Next {
    this.#finishHeader();
    this.#isInHeader = false;
    const { maxNodes } = this.#context.limits;
    if (this.#nodes.length >= maxNodes) {
      throw new ScanStop(problem("limit.nodes", { limit: maxNodes }, this.#context.at(start)));
    }
    const element = { name, nodeClass, attributes, start };
    const node = openNode(this.#context, element, this.#nodes.length, (one) => this.#offsets.get(one.key));
    if (node) {
      this.#offsets.set(node.key, start);
      return "node";
    }
    this.#context.isWhole = false;
    return this.#openCapture("nothing", name, attributes, start, start, () => undefined);
  }

  #openInNode(local: string, attributes: Attributes, start: number, end: number): Next | undefined {
    const { node } = this.#context;
    if (!node) return undefined;
    const { nodeClass } = node.fields;
    switch (local) {
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
        return this.#openCapture("content", local, attributes, start, end, (text) =>
          (node.translations ??= []).push(text),
        );
      case "ArgumentDescription":
        if (nodeClass !== "Method") return undefined;
        this.#context.argument = { name: "", description: [] };
        return "argument";
      case "Definition":
        if (nodeClass !== "DataType") return undefined;
        openDefinition(this.#context, attributes, start);
        return "definition";
      default:
        return undefined;
    }
  }

  #openInModels(local: string, attributes: Attributes, start: number): State | undefined {
    const model = this.#context.models.at(-1);
    if (local === (model ? "RequiredModel" : "Model")) {
      openModel(this.#context, local, attributes, start);
      return "model";
    }
    if (!model || local !== "RolePermissions") return undefined;
    model.roles ??= [];
    return "roles";
  }

  #openCapture(
    mode: CaptureMode,
    name: string,
    attributes: Attributes,
    start: number,
    end: number,
    into: (text: XmlText) => void,
  ): "captured" {
    if (mode === "content" || mode === "value") this.#notes.openCaptured(name, this.#isInHeader);
    const element = { name, attributes, start, end, depth: this.#states.length };
    this.#capture.begin(mode, element, this.#rootDefaultUri, into);
    return "captured";
  }

  /** Keeps an element that the schema does not know where it stands. */
  #openUnknown(name: string, attributes: Attributes, start: number, end: number): void {
    const into = this.#findPlaceForUnknown();
    const before = this.#notes.takeMarks();
    this.#openCapture("whole", name, attributes, start, end, (text) => {
      const kept = before.length === 0 ? text : { ...text, xml: before.join("") + text.xml };
      if (into) into.push(kept);
      else this.#notes.addElement(kept);
    });
  }

  #findPlaceForUnknown(): XmlText[] | undefined {
    const { header, node, models, definition, field } = this.#context;
    if (this.#state === "leaf" || isTable(this.#state)) return undefined;
    if (field) return othersOf(field);
    if (definition) return othersOf(definition);
    if (node) return (node.otherElements ??= []);
    const model = models.at(-1);
    return model ? (model.otherElements ??= []) : header.otherElements;
  }

  #noteTable(element: string, start: number): void {
    if (!this.#hasIds) return;
    this.#context.report(problem.hint("nodeset.header-order", { element }), start);
    this.#isLate = true;
  }

  /** To be called before the first node and at the end: what was collected until then decides what ids mean. */
  #finishHeader(): void {
    const { header } = this.#context;
    if (this.#isLate && !this.#tables) this.lateTables = header.toIdTables();
    if (this.#hasIds) return;
    this.#hasIds = true;
    const tables = this.#tables ?? header.toIdTables();
    this.#context.ids = new IdTable(tables.namespaceUris, tables.serverUris, tables.aliases);
  }

  #addExtension(text: XmlText): void {
    const { header, node } = this.#context;
    (this.#isInHeader ? header.extensions : node?.extensions)?.push(text);
  }

  #closeState(): void {
    const context = this.#context;
    switch (this.#state) {
      case "node":
        if (context.node) this.#nodes.push(context.node.build());
        context.node = undefined;
        break;
      case "definition":
        if (context.definition && context.node) context.node.fields.definition = context.definition;
        context.definition = undefined;
        break;
      case "field":
        context.field = undefined;
        break;
      case "argument":
        if (context.argument && context.node) (context.node.argumentDescriptions ??= []).push(context.argument);
        context.argument = undefined;
        break;
      case "model": {
        const model = context.models.pop();
        const parent = context.models.at(-1);
        if (model) (parent ? parent.requiredModels : context.header.models).push(model);
        break;
      }
      case "root":
        this.#finishHeader();
        break;
      default:
        break;
    }
  }
}
