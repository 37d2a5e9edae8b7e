import { readFileSync } from "node:fs";
import { join } from "node:path";
import ts from "typescript";
import { describe, expect, test } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { makeInterfaceDocument } from "~/domain/release/interface-document";
import { writeInterfaceHtml } from "~/domain/release/interface-html";
import { writePythonConstants, writeTypeScriptConstants } from "~/domain/release/node-id-constants";
import { getPublishedLayer, getStandardLayer } from "../../../support/published-layers";
import { projectRoot } from "../../../support/source-files";

function readDemo(): AddressSpace {
  const text = readFileSync(join(projectRoot, "nodesets/demo/merrow-rope-braider.NodeSet2.xml"), "utf8");
  const { header, nodes } = getValue(readNodeSet(text));
  const required = [
    getStandardLayer(),
    getPublishedLayer("Opc.Ua.Di.NodeSet2.xml"),
    getPublishedLayer("Opc.Ua.IA.NodeSet2.xml"),
  ];
  return AddressSpace.of(required, buildLayer(header, nodes));
}

/** Expected values: the demo's plan (names, types, units, ranges of the rope braider), not the code under test. */
describe("the interface of the rope braider", () => {
  const space = readDemo();
  const document = makeInterfaceDocument(space);
  const braider = document.owners.find((owner) => owner.name === "RopeBraiderType");

  test("tells members with path, type, unit, range and access", () => {
    const find = (path: string) => braider?.members.find((member) => member.path === path);
    expect(find("Process/SpindleSpeed")).toMatchObject({
      dataType: "Float",
      unit: "r/min",
      range: "0 … 180",
      isOptional: false,
    });
    expect(find("Environment/GearboxTemperature")).toMatchObject({ dataType: "Float", unit: "°C", range: "−20 … 90" });
    expect(find("Process/PicksCounter")).toMatchObject({ dataType: "UInt32", unit: null, isOptional: true });
    expect(find("Process/SpindleSpeed/EURange")).toBeUndefined();
  });

  test("tells the meaning of values and the arguments of Methods", () => {
    const state = braider?.members.find((member) => member.path === "Status/State");
    expect(state?.meanings.map(({ value, name }) => `${value} ${name}`)).toEqual([
      "0 Off",
      "1 Setup",
      "2 Running",
      "3 Waiting",
      "4 Fault",
    ]);
    const fault = braider?.members.find((member) => member.path === "Status/FaultNumber");
    expect(fault?.meanings.map(({ value }) => value)).toEqual([0, 11, 12, 21, 31]);
    const method = braider?.members.find((member) => member.path === "SelectRecipe");
    expect([method?.input, method?.output]).toMatchObject([
      [{ name: "RecipeNumber", dataType: "UInt16" }],
      [{ name: "Accepted", dataType: "Boolean" }],
    ]);
  });

  test("is written as a page without script, whose texts are escaped", () => {
    const page = writeInterfaceHtml(
      document,
      { modelName: "<Rope>", version: "1.0.0", publicationDate: "2026-12-01T00:00:00Z", revision: 3 },
      "de",
    );
    expect(page).toContain('<html lang="de">');
    expect(page).toContain("Schnittstelle: &#60;Rope&#62; 1.0.0");
    expect(page).not.toMatch(/<script|<Rope>/);
    expect(page).toContain("Process/SpindleSpeed");
    expect(page).toContain("@media print");
  });

  test("gives constants that TypeScript compiles and that name every node once", () => {
    const source = writeTypeScriptConstants(space, "Rope braider 1.0.0");
    const { diagnostics = [] } = ts.transpileModule(source, {
      reportDiagnostics: true,
      compilerOptions: { strict: true },
    });
    expect(diagnostics).toEqual([]);
    const names = [...source.matchAll(/^ {2}(\w+): "nsu=/gm)].map((match) => match[1]);
    expect(new Set(names).size).toBe(space.own.nodes.size);
    const python = [...writePythonConstants(space, "Rope braider 1.0.0").matchAll(/^ {4}([A-Za-z_]\w*) = "nsu=/gm)];
    expect(python).toHaveLength(space.own.nodes.size);
  });
});
