import { describe, expect, it } from "vitest";
import type { NodeKey } from "~/domain/address-space/node-id";
import { standardKey } from "~/domain/address-space/node-id";
import { StandardDataType, StandardReferenceType, StandardType } from "~/domain/address-space/standard-ids";
import { getReferenceTypes } from "~/domain/address-space/type-hierarchy";
import { addEnumeration } from "~/domain/editing/commands/add-enumeration";
import { addMethod, addObject, addProperty, addVariable } from "~/domain/editing/commands/add-member";
import { addType } from "~/domain/editing/commands/add-type";
import { checkReference, listLawfulReferences } from "~/domain/editing/lawful-references";
import { NAMED_TYPES, typedEnds } from "~/domain/editing/typed-ends";
import { Workbench } from "../../../support/command-harness";

const bench = new Workbench();
const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "AType" });
const other = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "OtherType" });
const variableType = bench.do(addType, { supertype: StandardType.BaseDataVariableType, name: "VType" });
const face = bench.do(addType, { supertype: StandardType.BaseInterfaceType, name: "IFaceType", isAbstract: true });
const folder = bench.do(addObject, {
  parent: standardKey(85),
  name: "Folder",
  typeDefinition: StandardType.FolderType,
});
const object = bench.do(addObject, { parent: standardKey(85), name: "Object" });
const part = bench.do(addObject, { parent: object, name: "Part" });
const variable = bench.do(addVariable, { parent: object, name: "Variable" });
const property = bench.do(addProperty, { parent: object, name: "Property" });
const method = bench.do(addMethod, { parent: object, name: "Method" });
const state = bench.do(addEnumeration, { name: "Enum", fields: [{ name: "A", value: 0 }] });

function usual(source: NodeKey, target: NodeKey): string[] {
  return listLawfulReferences(bench.space, source, target)
    .choices.filter((c) => c.isUsual)
    .map((c) => c.name);
}

function refused(source: NodeKey, referenceType: NodeKey, target: NodeKey): string | undefined {
  return checkReference(bench.space, source, referenceType, target)?.code;
}

describe("listLawfulReferences", () => {
  // OPC 10000-3 §7.7–7.20, §5.6.3: which ends each reference type has.
  it("offers the usual types first, for each pair of classes", () => {
    expect(usual(folder, object)).toEqual(["Organizes", "HasComponent", "HasOrderedComponent"]);
    expect(usual(type, part)).toEqual(["HasComponent", "Organizes", "HasOrderedComponent"]);
    expect(usual(type, variable)).toEqual(["HasComponent", "Organizes", "HasOrderedComponent"]);
    expect(usual(type, property)).toEqual(["HasProperty", "Organizes"]);
    expect(usual(type, method)).toEqual(["HasComponent", "Organizes", "HasOrderedComponent"]);
    expect(usual(variableType, variable)).toEqual(["HasComponent", "HasOrderedComponent"]);
    expect(usual(type, face)).toEqual(["HasInterface", "Organizes"]);
    expect(usual(type, StandardType.BaseEventType)).toEqual(["Organizes", "GeneratesEvent"]);
    expect(usual(state, property)).toEqual(["HasProperty"]);
  });

  it("says why none of the usual types fits", () => {
    const { choices, refusals } = listLawfulReferences(bench.space, property, variable);
    expect(choices.filter((c) => c.isUsual)).toEqual([]);
    expect(refusals.map((p) => p.code)).toContain("reference.property-is-leaf");
    expect(refusals.every((p) => String(p.data?.["clause"]).startsWith("OPC 10000-3 §"))).toBe(true);
  });

  it("never offers abstract or deprecated types, nor what checkReference refuses", () => {
    for (const [source, target] of [
      [object, part],
      [type, other],
      [folder, variable],
    ] as const) {
      for (const choice of listLawfulReferences(bench.space, source, target).choices) {
        expect(bench.space.getNode(choice.type)).not.toMatchObject({ isAbstract: true });
        expect(refused(source, choice.type, target)).toBeUndefined();
      }
    }
  });

  it("asks for typed ends of state machines and PubSub", () => {
    const names = listLawfulReferences(bench.space, folder, part).choices.map((c) => c.name);
    for (const name of [
      "FromState",
      "HasSubStateMachine",
      "HasDataSetWriter",
      "HasHistoricalConfiguration",
      "HasCondition",
    ]) {
      expect(names).not.toContain(name);
    }
  });
});

describe("checkReference", () => {
  it("holds the rules of OPC 10000-3 §7", () => {
    const R = StandardReferenceType;
    expect(refused(object, R.HasProperty, part)).toBe("reference.property-target");
    expect(refused(type, R.HasProperty, variable)).toBe("reference.component-as-property");
    expect(refused(type, R.HasComponent, property)).toBe("reference.property-as-component");
    expect(refused(variable, R.HasComponent, part)).toBe("reference.component-object-source");
    expect(refused(type, R.HasComponent, other)).toBe("reference.component-target");
    expect(refused(type, R.HasSubtype, other)).toBe("reference.second-supertype");
    expect(refused(type, R.HasSubtype, variableType)).toBe("reference.subtype-ends");
    expect(refused(object, R.HasTypeDefinition, type)).toBe("reference.only-one");
    expect(refused(variable, R.Organizes, part)).toBe("reference.organizes-source");
    expect(refused(face, R.HasInterface, face)).toBe("reference.interface-ends");
    expect(refused(type, R.HasInterface, StandardType.BaseInterfaceType)).toBe("reference.interface-ends");
    expect(refused(type, R.GeneratesEvent, other)).toBe("reference.event-ends");
    expect(refused(type, R.HasAddIn, variable)).toBe("reference.add-in-ends");
    expect(refused(object, R.HasAddIn, folder)).toBe("reference.add-in-type");
    expect(refused(state, R.HasComponent, variable)).toBe("reference.data-type-source");
    expect(refused(state, R.HasEncoding, part)).toBe("reference.encoding-ends");
    expect(refused(object, R.HierarchicalReferences, part)).toBe("reference.abstract");
    expect(refused(object, StandardDataType.Double, part)).toBe("reference.no-reference-type");
  });
});

describe("typed ends", () => {
  it("name reference types and types as the published base NodeSet does", () => {
    const known = getReferenceTypes(bench.space, StandardReferenceType.References);
    for (const [key, { name }] of typedEnds) {
      expect(known.has(key)).toBe(true);
      expect(bench.space.getNode(key)?.browseName.name).toBe(name);
    }
    for (const [id, name] of Object.entries(NAMED_TYPES)) {
      expect([id, bench.space.getNode(standardKey(Number(id)))?.browseName.name]).toEqual([id, name]);
    }
  });
});
