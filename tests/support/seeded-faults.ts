/** Faults of known kinds, planted into valid models at places that a seed chooses. Each names the rule that must find it. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import {
  hasValueAttributes,
  isTypeNode,
  type DataTypeNode,
  type Node,
  type VariableNode,
} from "~/domain/address-space/node";
import { numericNodeId, OPC_UA_NAMESPACE, standardKey, type NodeKey } from "~/domain/address-space/node-id";
import {
  StandardDataType as D,
  StandardModellingRule as M,
  StandardReferenceType as R,
  StandardType as T,
} from "~/domain/address-space/standard-ids";
import { listSupertypes } from "~/domain/address-space/type-hierarchy";
import { extensionObject, list, range, scalar, unit } from "~/domain/checks/example-values";
import type { Random } from "./random";

export type Planted = { readonly rule: string; readonly key: NodeKey | undefined; readonly space: AddressSpace };
type Fault = { readonly rule: string; readonly plant: (at: Site) => Planted | undefined };

/** What a fault chooses its place from. */
class Site {
  readonly space: AddressSpace;
  readonly random: Random;
  readonly rule: string;

  constructor(space: AddressSpace, random: Random, rule: string) {
    this.space = space;
    this.random = random;
    this.rule = rule;
  }

  pick(matches: (node: Node) => boolean): Node | undefined {
    const found = this.space.listOwnNodes().filter(matches);
    return found.length === 0 ? undefined : found[this.random.below(found.length)];
  }

  /** Changes attributes of a node that matches; the finding must stand at it, or at `at`. */
  change(
    matches: (node: Node) => boolean,
    change: (node: Node) => object,
    at?: (node: Node) => NodeKey,
  ): Planted | undefined {
    const node = this.pick(matches);
    if (!node) return undefined;
    const space = this.space.withNode({ ...node, ...change(node) } as Node);
    return { rule: this.rule, key: at ? at(node) : node.key, space };
  }

  /** Replaces declared references. */
  refer(
    matches: (node: Node) => boolean,
    change: (references: Node["references"]) => Node["references"],
    at?: (node: Node) => NodeKey,
  ) {
    return this.change(matches, (node) => ({ references: change(node.references) }), at);
  }

  typeOf(key: NodeKey): NodeKey | undefined {
    return this.space.edgesFrom(key).find((e) => e.type === R.HasTypeDefinition)?.target;
  }

  ruleOf(key: NodeKey): NodeKey | undefined {
    return this.space.edgesFrom(key).find((e) => e.type === R.HasModellingRule)?.target;
  }

  isBelow(type: NodeKey | undefined, ancestor: NodeKey): boolean {
    return type !== undefined && (type === ancestor || listSupertypes(this.space, type).includes(ancestor));
  }

  parentOf(node: Node): NodeKey {
    return node.references.find((r) => !r.isForward && r.type !== R.HasSubtype)?.target ?? node.key;
  }

  /** An instance declaration: with a rule below a type, or below another declaration. */
  isMember(node: Node, depth = 0): boolean {
    const parent = this.space.own.nodes.get(this.parentOf(node));
    if (this.ruleOf(node.key) === undefined || !parent || depth > 20) return false;
    return parent.nodeClass === "ObjectType" || parent.nodeClass === "VariableType" || this.isMember(parent, depth + 1);
  }

  childrenOf(key: NodeKey): Node[] {
    return this.space.listOwnNodes().filter((n) => this.parentOf(n) === key && n.key !== key);
  }
}

const isVariable = (node: Node): node is VariableNode => node.nodeClass === "Variable";
const isProperty = (node: Node): boolean => node.references.some((r) => r.type === R.HasProperty && !r.isForward);
const isComponent = (node: Node): boolean => node.references.some((r) => r.type === R.HasComponent && !r.isForward);
const hasName = (node: Node, name: string): boolean =>
  node.browseName.name === name && node.browseName.namespaceUri === OPC_UA_NAMESPACE;
const isStandardInstance = (node: Node): boolean => isVariable(node) || node.nodeClass === "Object";
const MISSING = standardKey(4294967290);

function fault(rule: string, plant: Fault["plant"]): Fault {
  return { rule, plant };
}

const swap = (type: NodeKey, target: NodeKey) => (references: Node["references"]) =>
  references.map((r) => (r.type === type ? { ...r, target } : r));
const retype = (from: NodeKey, to: NodeKey) => (references: Node["references"]) =>
  references.map((r) => (r.type === from ? { ...r, type: to } : r));
const without = (type: NodeKey) => (references: Node["references"]) => references.filter((r) => r.type !== type);

export const FAULTS: readonly Fault[] = [
  fault("R001", (s) =>
    s.change(
      () => true,
      () => ({ nodeId: numericNodeId(OPC_UA_NAMESPACE, 0) }),
    ),
  ),
  fault("R002", (s) => {
    const twin = s.pick(() => true);
    return (
      twin &&
      s.change(
        (n) => n.key !== twin.key,
        () => ({ nodeId: twin.nodeId }),
      )
    );
  }),
  fault("R004", (s) =>
    s.change(
      () => true,
      () => ({ nodeId: numericNodeId("http://example.org/UA/Nobody/", 1) }),
    ),
  ),
  fault("R006", (s) =>
    s.change(
      (n) => !isProperty(n),
      (n) => ({ browseName: { ...n.browseName, name: "x".repeat(513 + s.random.below(50)) } }),
    ),
  ),
  fault("R006", (s) =>
    s.change(
      () => true,
      (n) => ({ browseName: { ...n.browseName, name: `${n.browseName.name}\u0007` } }),
    ),
  ),
  fault("R008", (s) => {
    const type = s.pick(isTypeNode);
    return (
      type &&
      s.change(
        (n) => isTypeNode(n) && n.key !== type.key,
        () => ({ browseName: type.browseName }),
      )
    );
  }),
  fault("R009", (s) => {
    const member = s.pick((n) => s.isMember(n) && s.childrenOf(s.parentOf(n)).length > 1);
    const parent = member && s.parentOf(member);
    const [first, second] = parent === undefined ? [] : s.childrenOf(parent).filter((n) => s.isMember(n));
    if (!first || !second) return undefined;
    return {
      rule: "R009",
      key: second.key,
      space: s.space.withNode({ ...second, browseName: first.browseName } as Node),
    };
  }),
  fault("R012", (s) =>
    s.change(
      (n) => isProperty(n) && (hasName(n, "EURange") || hasName(n, "EngineeringUnits")),
      (n) => ({ browseName: { ...n.browseName, namespaceUri: n.nodeId.namespaceUri } }),
    ),
  ),
  fault("R016", (s) =>
    s.change(
      () => true,
      () => ({ displayName: [] }),
    ),
  ),
  fault("R017", (s) =>
    s.change(
      () => true,
      (n) => ({
        displayName: [
          { locale: "en", text: "a" },
          { locale: "en", text: n.browseName.name },
        ],
      }),
    ),
  ),
  fault("R022", (s) =>
    s.change(
      () => true,
      () => ({ symbolicName: "no identifier" }),
    ),
  ),
  fault("R023", (s) => s.refer(isStandardInstance, swap(R.HasTypeDefinition, MISSING))),
  fault("R023", (s) => s.refer((n) => s.ruleOf(n.key) !== undefined, swap(R.HasModellingRule, MISSING))),
  fault("R024", (s) => s.refer(isComponent, retype(R.HasComponent, R.Aggregates))),
  fault("R025", (s) => s.refer(isComponent, (r) => [...r, ...r.filter((x) => x.type === R.HasComponent)])),
  fault("R026", (s) =>
    s.change(
      (n) => n.nodeClass === "Object",
      (n) => ({ references: [...n.references, { type: R.Organizes, target: n.key, isForward: true }] }),
    ),
  ),
  fault("R029", (s) => {
    const type = s.pick(isTypeNode);
    return (
      type &&
      s.refer(
        (n) => n.nodeClass === "Object",
        (r) => [...r, { type: R.HasComponent, target: type.key, isForward: true }],
      )
    );
  }),
  fault("R031", (s) => {
    const variable = s.pick((n) => isVariable(n) && isComponent(n));
    const object = s.pick((n) => n.nodeClass === "Object");
    if (!variable || !object) return undefined;
    const reference = { type: R.HasComponent, target: object.key, isForward: true };
    return {
      rule: "R031",
      key: variable.key,
      space: s.space.withNode({ ...variable, references: [...variable.references, reference] } as Node),
    };
  }),
  fault("R032", (s) =>
    s.refer((n) => n.nodeClass === "Object" && isComponent(n), retype(R.HasComponent, R.HasProperty)),
  ),
  fault("R033", (s) => {
    const property = s.pick(isProperty);
    const child = s.pick((n) => isVariable(n) && isComponent(n));
    if (!property || !child) return undefined;
    const reference = { type: R.HasProperty, target: child.key, isForward: true };
    return {
      rule: "R033",
      key: property.key,
      space: s.space.withNode({ ...property, references: [...property.references, reference] } as Node),
    };
  }),
  fault("R035", (s) => s.refer(isProperty, swap(R.HasTypeDefinition, T.BaseDataVariableType))),
  fault("R036", (s) => s.refer((n) => isVariable(n) && isComponent(n), swap(R.HasTypeDefinition, T.PropertyType))),
  fault("R037", (s) => {
    const planted = s.refer((n) => isVariable(n) && isComponent(n), retype(R.HasComponent, R.Organizes));
    // Files that declare the reference at both ends still have it at the other.
    const isLeft =
      planted?.key !== undefined && planted.space.edgesTo(planted.key).some((e) => e.type === R.HasComponent);
    return isLeft ? undefined : planted;
  }),
  fault("R041", (s) => s.refer((n) => n.nodeClass === "ObjectType", swap(R.HasSubtype, T.BaseDataVariableType))),
  fault("R042", (s) => s.refer(isTypeNode, without(R.HasSubtype))),
  fault("R049", (s) => s.refer(isStandardInstance, without(R.HasTypeDefinition))),
  fault("R049", (s) => s.refer((n) => n.nodeClass === "Object", swap(R.HasTypeDefinition, T.BaseDataVariableType))),
  fault("R050", (s) =>
    s.refer(
      (n) => s.ruleOf(n.key) === M.Mandatory,
      (r) => [...r, { type: R.HasModellingRule, target: M.Optional, isForward: true }],
    ),
  ),
  fault("R066", (s) =>
    s.refer(
      (n) => n.nodeClass === "Object" && s.ruleOf(n.key) === undefined && isComponent(n),
      swap(R.HasTypeDefinition, T.BaseInterfaceType),
    ),
  ),
  fault("R075", (s) => s.refer((n) => s.isMember(n) && (isComponent(n) || isProperty(n)), without(R.HasModellingRule))),
  fault("R086", (s) => {
    const member = s.pick(
      (n) =>
        isComponent(n) &&
        n.nodeClass === "Object" &&
        s.ruleOf(n.key) === undefined &&
        s.space.isOwn(s.parentOf(n)) &&
        isMandatoryInType(s, n),
    );
    if (!member) return undefined;
    return {
      rule: "R086",
      key: s.parentOf(member),
      space: s.space.withNode({ ...member, references: without(R.HasComponent)(member.references) } as Node),
    };
  }),
  fault("R090", (s) =>
    s.change(
      (n) => isComponent(n) && n.nodeClass === "Object" && s.ruleOf(n.key) === undefined && isMandatoryInType(s, n),
      () => ({ nodeClass: "Method" }),
    ),
  ),
  fault("R095", (s) => s.change(isVariable, () => ({ dataType: MISSING }))),
  fault("R097", (s) =>
    s.change(
      (n) => isVariable(n) && s.isBelow(s.typeOf(n.key), T.BaseAnalogType),
      () => ({ dataType: D.String, value: undefined }),
    ),
  ),
  fault("R098", (s) =>
    s.change(
      (n) => isVariable(n) && s.isBelow(s.typeOf(n.key), T.AnalogItemType),
      () => ({ valueRank: -5 }),
    ),
  ),
  fault("R099", (s) =>
    s.change(
      (n) => isVariable(n) && (n.valueRank ?? -1) === -1,
      () => ({ arrayDimensions: "0" }),
    ),
  ),
  fault("R101", (s) =>
    s.change(
      (n) => isVariable(n) && (n.valueRank ?? -1) === -1 && n.dataType === D.Float,
      () => ({ value: list("Float", 1, 2) }),
    ),
  ),
  fault("R103", (s) =>
    s.change(
      (n) => isVariable(n) && n.dataType === D.Float,
      () => ({ value: scalar("String", "x") }),
    ),
  ),
  fault("R103", (s) =>
    s.change(
      (n) => isVariable(n) && n.dataType === D.Float,
      () => ({ value: scalar("Float", "1,5") }),
    ),
  ),
  fault("R105", (s) =>
    s.change(
      (n) => isVariable(n) && n.dataType === D.Range,
      () => ({ value: extensionObject("i=885", "<Range><Low>0</Low><Hi>1</Hi></Range>") }),
    ),
  ),
  fault("R107", (s) => s.change(isVariable, () => ({ accessLevel: 129 }))),
  fault("R112", (s) =>
    s.change(
      (n) => isVariable(n) && s.ruleOf(n.key) === undefined && isComponent(n),
      () => ({ historizing: true, accessLevel: 1 }),
    ),
  ),
  fault("R114", (s) =>
    s.change(
      (n) => n.nodeClass === "Object",
      () => ({ eventNotifier: 2 }),
    ),
  ),
  fault("R119", (s) => removeProperty(s, "EURange", T.AnalogItemType)),
  fault("R120", (s) => removeProperty(s, "EngineeringUnits", T.AnalogUnitRangeType)),
  fault("R123", (s) =>
    s.change(
      (n) => isVariable(n) && s.isBelow(s.typeOf(n.key), T.AnalogUnitRangeType),
      () => ({ dataType: D.Boolean, value: undefined }),
    ),
  ),
  fault("R125", (s) => changeUnit(s, "https://www.opcfoundation.org/UA/units/un/cefact", 4408652)),
  fault("R126", (s) => changeUnit(s, undefined, 1000 + s.random.below(200))),
  fault("R128", (s) =>
    s.change(
      (n) => isVariable(n) && n.dataType === D.Range && n.value !== undefined,
      () => ({ value: range(9, 1) }),
    ),
  ),
  fault("R145", (s) =>
    s.change(
      (n) => n.nodeClass === "DataType" && hasFields(n) && s.isBelow(n.key, D.Structure),
      (n) => ({ definition: withField(n as DataTypeNode, { dataType: MISSING }) }),
    ),
  ),
  fault("R142", (s) =>
    s.change(
      (n) => n.nodeClass === "DataType" && hasFields(n) && s.isBelow(n.key, D.Enumeration),
      (n) => ({ definition: withField(n as DataTypeNode, { value: 0 }, 1) }),
    ),
  ),
  fault("R174", (s) => withModel(s, { modelVersion: "1.04" })),
  fault("R175", (s) => withModel(s, { publicationDate: "2026-05-01T00:00:00" })),
  fault("R176", (s) =>
    withModel(s, {
      requiredModels: [
        {
          modelUri: OPC_UA_NAMESPACE,
          modelVersion: "9.0.0",
          publicationDate: "2099-01-01T00:00:00Z",
          requiredModels: [],
        },
      ],
    }),
  ),
  fault("R181", (s) => {
    const property = s.pick((n) => hasName(n, "StaticNodeIdTypes"));
    return property && { rule: "R181", key: s.parentOf(property), space: s.space.withoutNode(property.key) };
  }),
  fault("R183", (s) =>
    s.change(
      (n) => s.isMember(n),
      () => ({ parent: undefined }),
    ),
  ),
  fault("R192", (s) =>
    s.change(
      (n) => hasValueAttributes(n) && n.value !== undefined,
      () => ({ value: { xml: "<Double>1</Double><Double>2</Double>" } }),
    ),
  ),
];

function isMandatoryInType(site: Site, node: Node): boolean {
  const type = site.typeOf(site.parentOf(node));
  if (type === undefined) return false;
  return [type, ...listSupertypes(site.space, type)].some((t) =>
    site.space.edgesFrom(t).some((e) => {
      const member = site.space.getNode(e.target);
      return (
        e.type === R.HasComponent &&
        member?.browseName.name === node.browseName.name &&
        member.browseName.namespaceUri === node.browseName.namespaceUri &&
        site.ruleOf(member.key) === M.Mandatory
      );
    }),
  );
}

function removeProperty(site: Site, name: string, type: NodeKey): Planted | undefined {
  const property = site.pick(
    (n) => hasName(n, name) && site.ruleOf(n.key) === undefined && site.isBelow(site.typeOf(site.parentOf(n)), type),
  );
  return property && { rule: site.rule, key: site.parentOf(property), space: site.space.withoutNode(property.key) };
}

function changeUnit(site: Site, uri: string | undefined, unitId: number): Planted | undefined {
  return site.change(
    (n) => hasName(n, "EngineeringUnits") && hasValueAttributes(n) && n.value !== undefined,
    () => ({
      value: unit({ ...(uri === undefined ? {} : { uri }), unitId, symbol: "x", name: "x" }),
    }),
  );
}

function hasFields(node: Node): boolean {
  return node.nodeClass === "DataType" && (node.definition?.fields.length ?? 0) > 1;
}

function withField(node: DataTypeNode, change: object, at = 0): DataTypeNode["definition"] {
  const definition = node.definition;
  return definition && { ...definition, fields: definition.fields.map((f, i) => (i === at ? { ...f, ...change } : f)) };
}

function withModel(site: Site, change: object): Planted {
  const { header } = site.space.own;
  const models = header.models.map((m) => ({ ...m, ...change }));
  return { rule: site.rule, key: undefined, space: site.space.withHeader({ ...header, models }) };
}

/** Plants one fault of the kind; undefined where the model has no place for it. */
export function plantFault(space: AddressSpace, { rule, plant }: Fault, random: Random): Planted | undefined {
  return plant(new Site(space, random, rule));
}
