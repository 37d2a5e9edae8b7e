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
import { ALL_CLASSES, NEEDS, type ModelRule, type Need, type NodeRule, type Rule, type WiringRule } from "./rule";

export class RuleTable {
  readonly model: readonly ModelRule[];
  readonly wiring: readonly WiringRule[];
  readonly #rules: readonly NodeRule[];
  readonly #attributes: readonly string[];
  readonly #names: readonly string[];
  readonly #declared: readonly NodeKey[];
  readonly #types: readonly NodeKey[];
  readonly #byKind = new Map<string, readonly NodeRule[]>();
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
    const kind = `${ALL_CLASSES.indexOf(node.nodeClass)} ${needs} ${attributes} ${declared} ${types} ${standard}`;
    let rules = this.#byKind.get(kind);
    if (!rules) {
      const isAny = (wanted: readonly string[] | undefined, all: readonly string[], bits: number): boolean =>
        wanted === undefined || wanted.some((w) => (bits & (1 << all.indexOf(w))) !== 0);
      rules = this.#rules.filter(
        (rule) =>
          rule.concerns.includes(node.nodeClass) &&
          (toBits(rule.needs ?? []) & ~needs) === 0 &&
          isAny(rule.attributes, this.#attributes, attributes) &&
          isAny(rule.declares && [rule.declares], this.#declared, declared) &&
          isAny(rule.types, this.#types, types) &&
          (rule.standardNames === undefined || (standard >= 0 && rule.standardNames.includes(name))),
      );
      this.#byKind.set(kind, rules);
    }
    return rules;
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

/** What the node has of what rules may need, as bits in the order of `NEEDS`. */
function findNeeds(node: Node, ctx: CheckContext): number {
  const { key } = node;
  const value = hasValueAttributes(node) ? node.value : undefined;
  const isType = isTypeNode(node);
  const hasRule = findModellingRule(ctx, key) !== undefined;
  const isBelowType = !isType && findTypeAbove(ctx, key) !== undefined;
  const isItsProperty = node.nodeClass === "Variable" && isProperty(ctx, key);
  const has: Readonly<Record<Need, boolean>> = {
    value: value !== undefined,
    structure: value !== undefined && value.xml.includes("ExtensionObject"),
    children: ctx.childEdges(key).length > 0,
    "modelling rule": hasRule,
    "declares members": isType || (hasRule && isBelowType && isInstanceDeclaration(ctx, key)),
    "type above": isBelowType,
    "no type above": !isType && !isBelowType,
    "member of type": isBelowType && isMemberOfType(ctx, key),
    property: isItsProperty,
    "no property": !isItsProperty,
    "text id": node.nodeId.type !== "i",
  };
  let bits = 0;
  for (let i = 0; i < NEEDS.length; i++) if (has[NEEDS[i] as Need]) bits |= 1 << i;
  return bits;
}

function toBits(needs: readonly Need[]): number {
  return needs.reduce((bits, need) => bits | (1 << NEEDS.indexOf(need)), 0);
}

function unite<T extends string>(lists: readonly (readonly T[] | undefined)[]): T[] {
  return [...new Set(lists.flatMap((list) => list ?? []))];
}
