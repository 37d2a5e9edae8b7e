import { describe, expect, it } from "vitest";
import { findModellingRule } from "~/domain/address-space/browse";
import { standardKey } from "~/domain/address-space/node-id";
import { StandardDataType, StandardReferenceType, StandardType } from "~/domain/address-space/standard-ids";
import { addEnumeration } from "~/domain/editing/commands/add-enumeration";
import { addMethod, addObject, addProperty, addVariable } from "~/domain/editing/commands/add-member";
import { addStructure } from "~/domain/editing/commands/add-structure";
import { addType } from "~/domain/editing/commands/add-type";
import { connectNodes, disconnectNodes } from "~/domain/editing/commands/connect-nodes";
import { deleteNodes, findDeletion } from "~/domain/editing/commands/delete-nodes";
import { moveNode } from "~/domain/editing/commands/move-node";
import { renameNode } from "~/domain/editing/commands/rename-node";
import { setText } from "~/domain/editing/commands/set-text";
import { instantiate } from "~/domain/instantiation/instantiate";
import { Workbench } from "../../../../support/command-harness";

const { HasComponent, Organizes, HasSubtype, HasTypeDefinition } = StandardReferenceType;

describe("renameNode", () => {
  it("carries DisplayName, SymbolicName and the Definition's name along, and leaves other texts", () => {
    const bench = new Workbench();
    const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "OldType" });
    bench.do(setText, { node: type, attribute: "displayName", locale: "de", text: "Alter Typ" });
    bench.do(renameNode, { node: type, name: "New type" });
    expect(bench.node(type)).toMatchObject({
      browseName: { name: "New type" },
      symbolicName: "New_type",
      displayName: [{ text: "New type" }, { locale: "de", text: "Alter Typ" }],
    });
    bench.do(renameNode, { node: type, name: "NewType" });
    expect(bench.node(type)).not.toHaveProperty("symbolicName");
    const state = bench.do(addEnumeration, { name: "A", fields: [{ name: "X", value: 0 }] });
    bench.do(renameNode, { node: state, name: "B" });
    expect(bench.node(state)).toMatchObject({ definition: { name: { name: "B" } } });
  });

  it("refuses the name of a sibling and of another type", () => {
    const bench = new Workbench();
    const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "OneType" });
    bench.do(addType, { supertype: StandardType.BaseObjectType, name: "TwoType" });
    const a = bench.do(addObject, { parent: type, name: "A" });
    bench.do(addObject, { parent: type, name: "B" });
    expect(bench.refuse(renameNode, { node: a, name: "B" })).toEqual(["name.taken"]);
    expect(bench.refuse(renameNode, { node: type, name: "TwoType" })).toEqual(["name.taken"]);
    expect(bench.refuse(renameNode, { node: standardKey(58), name: "X" })).toEqual(["operation.node-foreign"]);
  });
});

describe("moveNode", () => {
  const bench = new Workbench();
  const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "T" });
  const a = bench.do(addObject, { parent: type, name: "A" });
  const b = bench.do(addObject, { parent: a, name: "B" });
  const property = bench.do(addProperty, { parent: a, name: "P" });

  it("takes the reference and ParentNodeId along", () => {
    bench.do(moveNode, { node: property, parent: type });
    expect(bench.node(property)).toMatchObject({ parent: type });
    expect(bench.space.edgesTo(property)).toContainEqual({ source: type, type: "i=46", target: property });
    expect(bench.space.edgesFrom(a).some((e) => e.target === property)).toBe(false);
  });

  it("refuses to move a node below itself and beside a node of its name", () => {
    expect(bench.refuse(moveNode, { node: a, parent: b })).toEqual(["move.below-itself"]);
    bench.do(addObject, { parent: b, name: "A" });
    expect(bench.refuse(moveNode, { node: a, parent: standardKey(999_999) })).toEqual(["operation.node-missing"]);
    const other = bench.do(addObject, { parent: type, name: "B" });
    expect(bench.refuse(moveNode, { node: other, parent: a })).toEqual(["name.taken"]);
  });

  it("gives a type another supertype of its class", () => {
    const sub = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "SubType" });
    bench.do(moveNode, { node: sub, parent: type });
    expect(
      bench.space
        .edgesTo(sub)
        .filter((e) => e.type === HasSubtype)
        .map((e) => e.source),
    ).toEqual([type]);
    expect(bench.refuse(moveNode, { node: type, parent: sub })).toEqual(["move.below-itself"]);
    expect(bench.refuse(moveNode, { node: sub, parent: StandardType.PropertyType })).toEqual([
      "reference.subtype-ends",
    ]);
  });

  it("gives a rule to what moves from an instance into a type", () => {
    const loose = bench.do(addObject, { parent: standardKey(85), name: "Loose" });
    bench.do(moveNode, { node: loose, parent: type });
    expect(findModellingRule(bench.space, loose)).toBe("i=78");
    expect(bench.space.edgesTo(loose).map((e) => e.type)).toContain(HasComponent);
  });
});

describe("deleteNodes", () => {
  it("deletes a type with all below it and restores it exactly", () => {
    const bench = new Workbench();
    const before = bench.space.own.nodes.size;
    const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "T" });
    const group = bench.do(addObject, { parent: type, name: "G" });
    bench.do(addVariable, {
      parent: group,
      name: "V",
      typeDefinition: StandardType.AnalogUnitRangeType,
      dataType: StandardDataType.Double,
    });
    bench.do(addMethod, {
      parent: type,
      name: "M",
      inputArguments: [{ name: "A", dataType: StandardDataType.Double }],
    });
    const deletion = findDeletion(bench.space, [type]);
    expect(deletion).toMatchObject({ references: [], uses: [] });
    expect(deletion.nodes).toHaveLength(7);
    bench.do(deleteNodes, { nodes: [type] });
    expect(bench.space.own.nodes.size).toBe(before);
  });

  it("keeps what is only organised, removes references of others, and takes encodings along", () => {
    const bench = new Workbench();
    const folder = bench.do(addObject, { parent: standardKey(85), name: "F", typeDefinition: StandardType.FolderType });
    const machine = bench.do(addObject, { parent: standardKey(85), name: "M" });
    bench.do(connectNodes, { source: folder, type: Organizes, target: machine });
    bench.do(deleteNodes, { nodes: [folder] });
    expect(bench.space.getNode(machine)).toBeDefined();
    expect(bench.space.edgesTo(machine).map((e) => e.source)).toEqual(["i=85"]);
    const count = bench.space.own.nodes.size;
    const structure = bench.do(addStructure, { name: "S", fields: [] });
    bench.do(deleteNodes, { nodes: [structure] });
    expect(bench.space.own.nodes.size).toBe(count);
  });

  it("is held back by what would lose its type, and tells it", () => {
    const bench = new Workbench();
    const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "T" });
    const state = bench.do(addEnumeration, { name: "E", fields: [{ name: "X", value: 0 }] });
    const instance = bench.do(instantiate, { type, parent: standardKey(85), name: "I" });
    const variable = bench.do(addVariable, { parent: instance, name: "V", dataType: state });
    expect(findDeletion(bench.space, [type, state]).uses).toEqual([
      { user: instance, used: type, kind: "type-definition" },
      { user: variable, used: state, kind: "data-type" },
    ]);
    expect(bench.refuse(deleteNodes, { nodes: [type] })).toEqual(["delete.in-use"]);
    expect(bench.refuse(deleteNodes, { nodes: [standardKey(58)] })).toEqual(["operation.node-foreign"]);
    bench.do(deleteNodes, { nodes: [type], allowUses: true });
    expect(bench.space.edgesFrom(instance).some((e) => e.type === HasTypeDefinition)).toBe(false);
  });
});

describe("connectNodes and disconnectNodes", () => {
  const bench = new Workbench();
  const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "T" });
  const member = bench.do(addObject, { parent: type, name: "A" });
  const folder = bench.do(addObject, { parent: standardKey(85), name: "F", typeDefinition: StandardType.FolderType });

  it("declares hierarchical references at the child and others at the source", () => {
    bench.do(connectNodes, { source: folder, type: Organizes, target: member });
    expect(bench.node(member).references).toContainEqual({ type: Organizes, target: folder, isForward: false });
    bench.do(connectNodes, {
      source: type,
      type: StandardReferenceType.GeneratesEvent,
      target: StandardType.BaseEventType,
    });
    expect(bench.node(type).references).toContainEqual({ type: "i=41", target: "i=2041", isForward: true });
    bench.do(disconnectNodes, { source: folder, type: Organizes, target: member });
    expect(bench.refuse(disconnectNodes, { source: type, type: HasComponent, target: member })).toEqual([
      "disconnect.last-parent",
    ]);
    expect(bench.refuse(disconnectNodes, { source: standardKey(58), type: HasSubtype, target: type })).toEqual([
      "disconnect.required",
    ]);
  });

  it("refuses loops, doubles and what the standard forbids", () => {
    expect(bench.refuse(connectNodes, { source: member, type: HasComponent, target: member })).toEqual([
      "reference.to-itself",
    ]);
    const inner = bench.do(addObject, { parent: member, name: "B" });
    expect(bench.refuse(connectNodes, { source: inner, type: HasComponent, target: member })).toEqual([
      "reference.loop",
    ]);
    expect(bench.refuse(connectNodes, { source: type, type: HasComponent, target: member })).toEqual([
      "operation.reference-exists",
    ]);
    expect(bench.refuse(connectNodes, { source: member, type: HasSubtype, target: type })).toEqual([
      "reference.subtype-ends",
    ]);
    expect(bench.refuse(connectNodes, { source: standardKey(85), type: Organizes, target: standardKey(58) })).toEqual([
      "operation.node-foreign",
    ]);
  });
});
