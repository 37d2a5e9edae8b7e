import { expect, it } from "vitest";
import { describeConsequences } from "~/components/model/describe-consequences";
import { standardKey } from "~/domain/address-space/node-id";
import { StandardDataType, StandardType } from "~/domain/address-space/standard-ids";
import { addObject, addVariable } from "~/domain/editing/commands/add-member";
import { addType } from "~/domain/editing/commands/add-type";
import { setText } from "~/domain/editing/commands/set-text";
import { listConsequences, touchesDeclarations } from "~/domain/instantiation/consequences";
import { instantiate } from "~/domain/instantiation/instantiate";
import { Workbench } from "../../../support/command-harness";

it("tells after an edit of a type how many copies do not follow, and where", () => {
  const bench = new Workbench();
  const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "MachineType" });
  const group = bench.do(addObject, { parent: type, name: "Process" });
  const machines = ["B1", "B2"].map((name) => bench.do(instantiate, { type, parent: standardKey(85), name }));
  const before = bench.space;
  const edit = addVariable(bench.space, bench.context, { parent: group, name: "Speed", dataType: StandardDataType.Float });
  if (!edit.ok) throw new Error("refused");
  expect(touchesDeclarations(before, edit.value.operations)).toBe(true);
  bench.do(addVariable, { parent: group, name: "Speed", dataType: StandardDataType.Float });
  bench.do(setText, { node: group, attribute: "description", text: "What the machine does" });
  expect(describeConsequences(bench.space, listConsequences(before, bench.space))).toBe("2 members are missing, 2 attributes are as before (B1, B2).");
  const own = setText(bench.space, bench.context, { node: machines[0] ?? type, attribute: "description", text: "The first" });
  expect(own.ok && touchesDeclarations(bench.space, own.value.operations)).toBe(false);
});
