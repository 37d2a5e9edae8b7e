import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { standardKey, type NodeKey } from "~/domain/address-space/node-id";
import {
  StandardDataType,
  StandardModellingRule,
  StandardReferenceType,
  StandardType,
} from "~/domain/address-space/standard-ids";
import { runChecks } from "~/domain/checks/run-checks";
import type { Result } from "~/domain/core/result";
import { addEnumeration } from "~/domain/editing/commands/add-enumeration";
import { addMethod, addObject, addProperty, addVariable } from "~/domain/editing/commands/add-member";
import { addStructure } from "~/domain/editing/commands/add-structure";
import { addType } from "~/domain/editing/commands/add-type";
import { connectNodes, disconnectNodes } from "~/domain/editing/commands/connect-nodes";
import { deleteNodes } from "~/domain/editing/commands/delete-nodes";
import { moveNode } from "~/domain/editing/commands/move-node";
import { renameNode } from "~/domain/editing/commands/rename-node";
import { setDataType } from "~/domain/editing/commands/set-data-type";
import { setModellingRule } from "~/domain/editing/commands/set-modelling-rule";
import { setRange, setUnit } from "~/domain/editing/commands/set-unit";
import type { Edit } from "~/domain/editing/edit-draft";
import { listLawfulReferences } from "~/domain/editing/lawful-references";
import { addDeclaredMembers, instantiate } from "~/domain/instantiation/instantiate";
import { toEuInformation, unitByCode } from "~/domain/units/units";
import { TEST_NAMESPACE } from "../../../../support/small-standard";
import { Workbench } from "../../../../support/command-harness";
import { expectOperations } from "../../../../support/expect-operation";

const CELSIUS = unitByCode("CEL");
const NAMES = ["Alpha", "Beta", "Gamma", "Delta", "Speed", "<Slot>"];
const TYPES = [StandardType.BaseObjectType, StandardType.FolderType];
const VARIABLE_TYPES = [
  StandardType.BaseDataVariableType,
  StandardType.AnalogUnitRangeType,
  StandardType.AnalogItemType,
];
const DATA_TYPES = [StandardDataType.Double, StandardDataType.Float, StandardDataType.UInt16];
const RULES = [
  StandardModellingRule.Mandatory,
  StandardModellingRule.Optional,
  StandardModellingRule.OptionalPlaceholder,
];

const step = fc.record({ what: fc.nat(14), a: fc.nat(500), b: fc.nat(500), c: fc.nat(500) });
type Step = { what: number; a: number; b: number; c: number };

function pick<T>(list: readonly T[], index: number): T {
  return list[index % list.length] as T;
}

/** One command on whatever the model holds; it may be refused, but what it makes must be lawful. */
function run(bench: Workbench, { what, a, b, c }: Step): Result<Edit> {
  const { space, context } = bench;
  const own = space
    .listOwnNodes()
    .map((n) => n.key)
    .slice(8);
  const some = (index: number): NodeKey => pick([...own, standardKey(85)], index);
  // What the standard names (EURange, encodings, EnumStrings) belongs to its owner; taking it away is a choice to be told.
  const named = own.filter((key) => bench.node(key).browseName.namespaceUri === TEST_NAMESPACE);
  const someNamed = (index: number): NodeKey => pick([...named, standardKey(85)], index);
  const typesOf = (nodeClass: string): NodeKey[] => own.filter((key) => bench.node(key).nodeClass === nodeClass);
  const name = `${pick(NAMES, a).replace(">", `${b % 7}>`)}${pick(NAMES, a).startsWith("<") ? "" : b % 7}`;
  switch (what) {
    case 0:
      return addType(space, context, { supertype: pick([...typesOf("ObjectType"), ...TYPES], b), name: `${name}Type` });
    case 1:
      return addObject(space, context, {
        parent: some(a),
        name,
        typeDefinition: pick([...typesOf("ObjectType"), ...TYPES], b),
      });
    case 2:
      return addVariable(space, context, {
        parent: some(a),
        name,
        typeDefinition: pick(VARIABLE_TYPES, b),
        dataType: pick(DATA_TYPES, c),
        range: { low: 0, high: c },
      });
    case 3:
      return addProperty(space, context, { parent: some(a), name });
    case 4:
      return addMethod(space, context, {
        parent: some(a),
        name,
        inputArguments: [{ name: "In", dataType: pick(DATA_TYPES, c) }],
      });
    case 5:
      return instantiate(space, context, {
        type: pick([...typesOf("ObjectType"), ...TYPES], a),
        parent: standardKey(85),
        name,
      });
    case 6:
      return renameNode(space, context, { node: someNamed(a), name });
    case 7:
      return moveNode(space, context, { node: someNamed(a), parent: some(b) });
    case 8:
      return deleteNodes(space, context, { nodes: [someNamed(a)] });
    case 9: {
      const choices = listLawfulReferences(space, some(a), someNamed(b)).choices.filter((choice) => choice.isUsual);
      const type = choices.length === 0 ? StandardReferenceType.HasComponent : pick(choices, c).type;
      return connectNodes(space, context, { source: some(a), type, target: someNamed(b) });
    }
    case 10: {
      const edge = pick(
        [...space.edgesTo(someNamed(a)), { source: some(b), type: StandardReferenceType.Organizes, target: some(a) }],
        c,
      );
      return disconnectNodes(space, context, edge);
    }
    case 11:
      return CELSIUS
        ? setUnit(space, context, { variable: some(a), unit: toEuInformation(CELSIUS) })
        : setRange(space, context, { variable: some(a) });
    case 12:
      return setDataType(space, context, { node: someNamed(a), dataType: pick(DATA_TYPES, b) });
    case 13:
      return addDeclaredMembers(space, context, { instance: some(a), includeMissing: true });
    default:
      return c % 2 === 0
        ? addEnumeration(space, context, { name: `${name}Enum`, fields: [{ name: "A", value: b % 3 }] })
        : addStructure(space, context, {
            name: `${name}Structure`,
            fields: [{ name: "F", dataType: pick(DATA_TYPES, b) }],
          });
  }
}

/**
 * Findings that a later command may bring about by what the user asked for, not by how it was done: a rule or type that
 * was changed under its instances, and optional-to-mandatory order among types. They are what the checker is for.
 */
const USERS_CHOICE = new Set(["R066", "R069", "R080", "R082", "R086", "R090", "R097", "R098", "R009"]);

describe("any run of commands", () => {
  it("keeps the model lawful: no error of the checker, but for what users may choose", () => {
    fc.assert(
      fc.property(fc.array(step, { minLength: 10, maxLength: 50 }), (steps) => {
        const bench = new Workbench();
        for (const made of steps) {
          const result = run(bench, made);
          if (result.ok && result.value.operations.length > 0)
            bench.space = expectOperations(bench.space, result.value.operations);
        }
        const errors = runChecks(bench.space).filter((f) => f.severity === "error" && !USERS_CHOICE.has(f.rule));
        expect(errors.map((f) => `${f.rule} ${f.path} ${f.message}`)).toEqual([]);
      }),
      { numRuns: 25, endOnFailure: true },
    );
  });

  it("sets rules that the checker accepts", () => {
    const bench = new Workbench();
    const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "T" });
    for (const [index, rule] of RULES.entries()) {
      const member = bench.do(addObject, {
        parent: type,
        name: rule === StandardModellingRule.OptionalPlaceholder ? "<M>" : `M${index}`,
      });
      bench.do(setModellingRule, { node: member, rule });
    }
    expect(runChecks(bench.space).filter((f) => f.severity === "error")).toEqual([]);
  });
});
