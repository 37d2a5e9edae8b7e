/**
 * Which rules a node can break at all. Nodes are sorted into kinds by what is cheap to know of them, and the rules of a kind
 * are chosen once: a model has a few dozen kinds, and most rules speak of few of them.
 */
import { hasValueAttributes, isTypeNode, type Node } from "../address-space/node";
import { OPC_UA_NAMESPACE, type NodeKey } from "../address-space/node-id";
import type { CheckContext } from "./check-context";
import {
  findModellingRule,
  findTypeAbove,
  findTypeDefinition,
  isInstanceDeclaration,
  isMemberOfType,
  isProperty,
  listSupertypes,
} from "./lookups";
import { ALL_CLASSES } from "./node-classes";
import { NEEDS, type ModelRule, type Need, type NodeRule, type Rule, type WiringRule } from "./rule";

export class RuleTable {
  readonly model: readonly ModelRule[];
  readonly wiring: readonly WiringRule[];
  readonly #rules: readonly NodeRule[];
  readonly #attributes: readonly string[];
  readonly #names: readonly string[];
  readonly #declared: readonly NodeKey[];
  readonly #types: readonly NodeKey[];
  /** By two numbers that hold all that a kind is: what the node is, and what it refers to. */
  readonly #byKind = new Map<number, Map<number, readonly NodeRule[]>>();
  readonly #declaredBits = new Map<NodeKey, number>();
  /** By the list of supertypes, which is another list after a change of these. */
  readonly #typeBits = new WeakMap<readonly NodeKey[], number>();

  constructor(rules: readonly Rule[]) {
    this.model = rules.filter((rule) => rule.concerns === "model");
    this.wiring = rules.filter((rule) => rule.concerns === "wiring");
    this.#rules = rules.filter((rule): rule is NodeRule => rule.concerns !== "model" && rule.concerns !== "wiring");
    this.#attributes = unite(this.#rules.map((rule) => rule.attributes));
    this.#names = unite(this.#rules.map((rule) => rule.standardNames));
    this.#declared = unite(this.#rules.map((rule) => rule.declares && [rule.declares]));
    this.#types = unite(this.#rules.map((rule) => rule.types));
  }

  /** The rules that the node can break, in the order of the table. */
  rulesFor(node: Node, ctx: CheckContext): readonly NodeRule[] {
    const needs = findNeeds(node, ctx);
    const attributes = this.#findAttributes(node);
    const declared = this.#findDeclared(node, ctx);
    const types = this.#findTypes(node, ctx);
    const { namespaceUri, name } = node.browseName;
    const standard = namespaceUri === OPC_UA_NAMESPACE ? this.#names.indexOf(name) : -1;
    // Products and not shifts: together they may have more than 32 bits.
    const itself = ((attributes * 64 + standard + 1) * ALL_NEEDS + needs) * 8 + ALL_CLASSES.indexOf(node.nodeClass);
    const references = types * 2 ** 16 + declared;
    let same = this.#byKind.get(itself);
    if (!same) this.#byKind.set(itself, (same = new Map()));
    let rules = same.get(references);
    if (!rules) same.set(references, (rules = this.#choose(node, { needs, attributes, declared, types, standard })));
    return rules;
  }

  #choose(node: Node, kind: Kind): NodeRule[] {
    const isAny = (wanted: readonly string[] | undefined, all: readonly string[], bits: number): boolean =>
      wanted === undefined || wanted.some((w) => (bits & (1 << all.indexOf(w))) !== 0);
    return this.#rules.filter(
      (rule) =>
        rule.concerns.includes(node.nodeClass) &&
        (toBits(rule.needs ?? []) & ~kind.needs) === 0 &&
        isAny(rule.attributes, this.#attributes, kind.attributes) &&
        isAny(rule.declares && [rule.declares], this.#declared, kind.declared) &&
        isAny(rule.types, this.#types, kind.types) &&
        (rule.standardNames === undefined || (kind.standard >= 0 && rule.standardNames.includes(node.browseName.name))),
    );
  }

  #findAttributes(node: Node): number {
    let bits = 0;
    for (let i = 0; i < this.#attributes.length; i++) {
      if ((node as unknown as Record<string, unknown>)[this.#attributes[i] as string] !== undefined) bits |= 1 << i;
    }
    return bits;
  }

  #findDeclared(node: Node, ctx: CheckContext): number {
    let bits = 0;
    for (const { type } of node.references) {
      let its = this.#declaredBits.get(type);
      if (its === undefined) {
        its = 0;
        for (const [i, root] of this.#declared.entries()) if (ctx.closure(root).has(type)) its |= 1 << i;
        this.#declaredBits.set(type, its);
      }
      bits |= its;
    }
    return bits;
  }

  #findTypes(node: Node, ctx: CheckContext): number {
    const type = findTypeDefinition(ctx, node.key);
    if (type === undefined) return 0;
    const above = listSupertypes(ctx, type);
    let bits = this.#typeBits.get(above);
    if (bits === undefined) {
      bits = 0;
      for (const [i, wanted] of this.#types.entries()) {
        if (type === wanted || above.includes(wanted)) bits |= 1 << i;
      }
      this.#typeBits.set(above, bits);
    }
    return bits;
  }
}

type Kind = Readonly<Record<"needs" | "attributes" | "declared" | "types" | "standard", number>>;

const ALL_NEEDS = 2 ** NEEDS.length;
const BIT = Object.fromEntries(NEEDS.map((need, i) => [need, 1 << i] as const)) as Readonly<Record<Need, number>>;

/** What the node has of what rules may need, as bits in the order of `NEEDS`. */
function findNeeds(node: Node, ctx: CheckContext): number {
  const { key } = node;
  const isType = isTypeNode(node);
  let bits = 0;
  if (hasValueAttributes(node) && node.value !== undefined) {
    bits |= BIT.value;
    if (node.value.xml.includes("ExtensionObject")) bits |= BIT.structure;
  }
  if (ctx.childEdges(key).length > 0) bits |= BIT.children;
  const hasRule = findModellingRule(ctx, key) !== undefined;
  const isBelowType = !isType && findTypeAbove(ctx, key) !== undefined;
  if (hasRule) bits |= BIT["modelling rule"];
  if (isType || (hasRule && isBelowType && isInstanceDeclaration(ctx, key))) bits |= BIT["declares members"];
  if (!isType) bits |= isBelowType ? BIT["type above"] : BIT["no type above"];
  if (isBelowType && isMemberOfType(ctx, key)) bits |= BIT["member of type"];
  bits |= node.nodeClass === "Variable" && isProperty(ctx, key) ? BIT.property : BIT["no property"];
  if (node.nodeId.type !== "i") bits |= BIT["text id"];
  return bits;
}

function toBits(needs: readonly Need[]): number {
  return needs.reduce((bits, need) => bits | BIT[need], 0);
}

function unite<T extends string>(lists: readonly (readonly T[] | undefined)[]): T[] {
  return [...new Set(lists.flatMap((list) => list ?? []))];
}
