/**
 * Makes the members of an instance, level by level.
 *
 * Each level asks `listMemberDeclarations` for what the sources declare and copies what is mandatory or chosen. Two rules
 * of the standard shape the walk:
 * - Declarations that two paths reach are one node in the instance too (OPC 10000-3 §6.4.3): a group that only organises
 *   a parameter gets a reference to the parameter, not a second one. So members by HasComponent and HasProperty are made
 *   first, and what is reached by other hierarchical references afterwards is looked up before it is made.
 * - The same declaration of a member's *type* is a new node for each member of that type (every analog item has its own
 *   EURange). Scopes keep these apart: the declarations of one type used in one place share a scope.
 */
import type { AddressSpace, Edge } from "../address-space/address-space";
import {
  isMandatory,
  listMemberDeclarations,
  listMemberSources,
  standsForMany,
  type DeclarationSource,
  type MemberDeclaration,
} from "../address-space/instance-declarations";
import type { DeclaredReference } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { qualifiedName, type QualifiedName } from "../address-space/qualified-name";
import { StandardReferenceType } from "../address-space/standard-ids";
import { getReferenceTypes, isHierarchical } from "../address-space/type-hierarchy";
import { problem } from "../core/result";
import type { EditDraft } from "../editing/edit-draft";
import { copyAttributes } from "./copy-attributes";
import type { MemberChoice } from "./member-choice";
import { walkInstance } from "./missing-members";

export type BuildOptions = {
  readonly choice: MemberChoice;
  /** Copies carry the modelling rules of their declarations: the instance is itself a declaration in a type. */
  readonly withRules: boolean;
  readonly methods: "copy" | "share";
};

const MAX_NODES = 20_000;
const MAX_DEPTH = 60;
const R = StandardReferenceType;

type Place = {
  readonly parent: NodeKey;
  readonly path: readonly QualifiedName[];
  readonly sources: readonly DeclarationSource[];
};

/** A member that hangs on its parent by other references than HasComponent and HasProperty, kept for the end. */
type Deferred = { readonly place: Place; readonly member: MemberDeclaration; readonly wantsMandatory: boolean };

export class InstanceBuilder {
  readonly #draft: EditDraft;
  /** The model before the members are made: what is declared does not change while they are. */
  readonly #declared: AddressSpace;
  readonly #options: BuildOptions;
  /** `scope + declaration` → the node made for it (or found on the instance). */
  readonly #nodes = new Map<string, NodeKey>();
  readonly #deferred: Deferred[] = [];
  #count = 0;
  #scopes = 0;

  constructor(draft: EditDraft, options: BuildOptions) {
    this.#draft = draft;
    this.#declared = draft.space;
    this.#options = options;
  }

  /** Remembers that `key` stands for declarations: the instance for its type, a member for what declares it. */
  #know(sources: readonly DeclarationSource[], key: NodeKey): void {
    for (const source of sources) this.#nodes.set(toId(source), key);
  }

  #newScope(): string {
    return `s${++this.#scopes}`;
  }

  /** Makes the members that `sources` give to the new node `parent`, and all below them. */
  build(parent: NodeKey, sources: readonly DeclarationSource[]): void {
    this.#know(sources, parent);
    this.#buildLevel({ parent, path: [], sources }, true);
    this.#finish();
  }

  /** Makes what was chosen, and with `includeMissing` what is mandatory, wherever the existing instance lacks it. */
  complete(instance: NodeKey, includeMissing: boolean): void {
    const levels = [...walkInstance(this.#draft.space, instance, () => this.#newScope())];
    for (const level of levels) {
      if (level.parent === instance) this.#know(level.sources, instance);
      for (const { member, child } of level.members) if (child) this.#know(member.declared, child.key);
    }
    for (const level of levels) this.#buildLevel(level, includeMissing);
    this.#finish();
  }

  #finish(): void {
    for (let next = this.#deferred.shift(); next && !this.#draft.hasFailed; next = this.#deferred.shift())
      this.#buildDeferred(next);
    this.#mirrorReferences();
    for (const asked of this.#options.choice.listUnmet()) {
      this.#draft.fail(problem("instantiate.no-such-member", { path: asked }));
    }
  }

  #buildLevel(place: Place, wantsMandatory: boolean): void {
    if (place.path.length > MAX_DEPTH) {
      this.#draft.fail(problem("instantiate.too-deep", { limit: MAX_DEPTH }));
      return;
    }
    const aggregates = getReferenceTypes(this.#draft.space, R.Aggregates);
    for (const member of listMemberDeclarations(this.#declared, place.sources)) {
      if (this.#draft.hasFailed) return;
      if (standsForMany(member.rule)) this.#buildPlaceholder(place, member);
      else if (member.referenceTypes.some((type) => aggregates.has(type)))
        this.#buildMember(place, member, wantsMandatory);
      else this.#deferred.push({ place, member, wantsMandatory });
    }
  }

  #buildMember(place: Place, member: MemberDeclaration, wantsMandatory: boolean): void {
    const isChosen = this.#options.choice.wants([...place.path, member.browseName]);
    const isWanted = isChosen || (wantsMandatory && isMandatory(member.rule));
    if (isWanted && this.#findMade(member) === undefined)
      this.#make(place, member, member.browseName, member.typeDefinition);
  }

  #findMade(member: MemberDeclaration): NodeKey | undefined {
    return member.declared.map((d) => this.#nodes.get(toId(d))).find((key) => key !== undefined);
  }

  #buildDeferred({ place, member, wantsMandatory }: Deferred): void {
    this.#buildMember(place, member, wantsMandatory);
    const known = this.#findMade(member);
    if (known === undefined) return;
    for (const type of member.referenceTypes) this.#connect({ source: place.parent, type, target: known });
  }

  /** A placeholder stands for any number of nodes with names of their own (§6.4.4.4.4): those that were named are made. */
  #buildPlaceholder(place: Place, member: MemberDeclaration): void {
    for (const named of this.#options.choice.listNamed([...place.path, member.browseName])) {
      const browseName = qualifiedName(named.namespaceUri ?? this.#draft.ownNamespace, named.name);
      this.#make(place, member, browseName, named.typeDefinition ?? member.typeDefinition);
    }
  }

  #make(place: Place, member: MemberDeclaration, browseName: QualifiedName, typeDefinition: NodeKey | undefined): void {
    if (++this.#count > MAX_NODES) {
      this.#draft.fail(problem("instantiate.too-many", { limit: MAX_NODES }));
      return;
    }
    const isMethod = member.node.nodeClass === "Method";
    if (isMethod && this.#options.methods === "share") {
      for (const type of member.referenceTypes) this.#connect({ source: place.parent, type, target: member.node.key });
      return;
    }
    const key = this.#draft.add({
      nodeClass: member.node.nodeClass,
      browseName,
      ...(standsForMany(member.rule) ? {} : { displayName: member.node.displayName }),
      ...(member.node.description ? { description: member.node.description } : {}),
      references: this.#listReferences(place, member, typeDefinition),
      attributes: { parent: place.parent, ...copyAttributes(this.#draft.space, member) },
    });
    if (key === undefined) return;
    if (!standsForMany(member.rule)) this.#know(member.declared, key);
    const sources = listMemberSources(this.#declared, member, this.#newScope(), typeDefinition);
    this.#buildLevel({ parent: key, path: [...place.path, browseName], sources }, true);
  }

  #listReferences(place: Place, member: MemberDeclaration, typeDefinition: NodeKey | undefined): DeclaredReference[] {
    const { space } = this.#draft;
    const references: DeclaredReference[] = member.referenceTypes.map((type) => ({
      type,
      target: place.parent,
      isForward: false,
    }));
    if (typeDefinition !== undefined)
      references.push({ type: R.HasTypeDefinition, target: typeDefinition, isForward: true });
    if (this.#options.withRules) {
      references.push({ type: R.HasModellingRule, target: member.rule, isForward: true });
    }
    const interfaces = new Set(
      member.declared.flatMap((d) =>
        space
          .edgesFrom(d.key)
          .filter((e) => e.type === R.HasInterface)
          .map((e) => e.target),
      ),
    );
    for (const target of interfaces) references.push({ type: R.HasInterface, target, isForward: true });
    return references;
  }

  #connect(edge: Edge): void {
    if (this.#draft.space.hasEdge(edge)) return;
    this.#draft.addReference(edge, this.#draft.space.isOwn(edge.target) ? "target" : "source");
  }

  /** References between declarations, or from one to a node outside, hold between the copies too (§6.4.3). */
  #mirrorReferences(): void {
    for (const [id, source] of this.#nodes) {
      const { scope, key } = fromId(id);
      if (!this.#draft.space.isOwn(source) || this.#draft.space.getNode(key)?.nodeClass.endsWith("Type")) continue;
      for (const edge of this.#draft.space.edgesFrom(key)) {
        if (isKeptOnType(edge.type) || isHierarchical(this.#draft.space, edge.type)) continue;
        const target = this.#nodes.get(toId({ key: edge.target, scope })) ?? this.#findOutside(edge.target);
        if (target !== undefined && target !== source) this.#connect({ source, type: edge.type, target });
      }
    }
  }

  /** What is no declaration is shared by all instances: a dictionary entry, a unit's description. */
  #findOutside(key: NodeKey): NodeKey | undefined {
    const { space } = this.#draft;
    const isDeclaration = space.edgesFrom(key).some((e) => e.type === R.HasModellingRule);
    return space.getNode(key) && !isDeclaration ? key : undefined;
  }
}

const KEPT_ON_TYPE: ReadonlySet<NodeKey> = new Set([
  R.HasTypeDefinition,
  R.HasModellingRule,
  R.HasInterface,
  R.GeneratesEvent,
  R.AlwaysGeneratesEvent,
]);

function isKeptOnType(type: NodeKey): boolean {
  return KEPT_ON_TYPE.has(type);
}

const SEPARATOR = "\u001f";

function toId({ key, scope }: DeclarationSource): string {
  return scope + SEPARATOR + key;
}

function fromId(id: string): DeclarationSource {
  const at = id.indexOf(SEPARATOR);
  return { scope: id.slice(0, at), key: id.slice(at + 1) as NodeKey };
}
