/** Boards of the demo hall: what its tiles say is read off the scenario's NodeSets, not off the code. */
import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { beforeAll, describe, expect, it } from "vitest";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import { getValue } from "~/domain/core/result";
import { listMachines } from "~/domain/instantiation/list-machines";
import { changeTile, makeBoard, moveTile, proposeLamp, resolveBoard, type BoardContent } from "~/domain/live/watch-board";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { getPublishedLayer, getStandardLayer } from "../../../support/published-layers";

let hall: AddressSpace;
let board: BoardContent;

function readDemo(name: string): Layer {
  const file = fileURLToPath(new URL(`../../../../nodesets/demo/${name}.NodeSet2.xml`, import.meta.url));
  const { header, nodes } = getValue(readNodeSet(readFileSync(file, "utf8")));
  return buildLayer(header, nodes);
}

beforeAll(() => {
  const required = [getStandardLayer(), getPublishedLayer("Opc.Ua.Di.NodeSet2.xml"), getPublishedLayer("Opc.Ua.IA.NodeSet2.xml"), getPublishedLayer("Opc.Ua.Machinery.NodeSet2.xml")];
  hall = AddressSpace.of([...required, readDemo("merrow-rope-braider")], readDemo("merrow-hall"));
  const [machine] = listMachines(hall);
  if (machine) board = makeBoard(hall, machine.key);
});

describe("makeBoard", () => {
  it("makes bars of analog values with unit and range, lamps of enumerations, in the five groups", () => {
    const tile = (title: string) => board.tiles.find((t) => t.title === title || t.path.endsWith(title.replaceAll(" ", "")));
    expect(new Set(board.tiles.map((t) => t.section)).size).toBeGreaterThanOrEqual(5);
    expect(tile("Spindle speed")).toMatchObject({ kind: "bar", unit: "r/min", range: { low: 0, high: 180 } });
    const states = board.tiles.filter((t) => t.kind === "state");
    expect(states.length).toBeGreaterThan(0);
    expect(states.flatMap((t) => t.states).length).toBeGreaterThan(2);
  });

  it("finds the same tiles at every machine of the type, under other NodeIds", () => {
    const machines = listMachines(hall);
    const ids = machines.map((machine) => resolveBoard(hall, machine.key, board));
    for (const found of ids) expect(Object.keys(found).length).toBeGreaterThan(10);
    const path = board.tiles.find((t) => t.kind === "bar")?.path ?? "";
    expect(new Set(ids.map((found) => found[path])).size).toBe(machines.length);
  });
});

describe("arranging", () => {
  it("moves a tile within its section and nowhere else", () => {
    const section = board.tiles[0]?.section;
    const first = board.tiles.filter((t) => t.section === section).map((t) => t.path);
    const moved = moveTile(board, first[1] ?? "", -1);
    expect(moved.tiles.filter((t) => t.section === section).map((t) => t.path).slice(0, 2)).toEqual([first[1], first[0]]);
    expect(moveTile(board, first[0] ?? "", -1).tiles.map((t) => t.path)).toEqual(board.tiles.map((t) => t.path));
    expect(changeTile(board, first[0] ?? "", { isHidden: true }).tiles[0]).toMatchObject({ isHidden: true });
  });
});

describe("proposeLamp", () => {
  // Colours by meaning: IEC 60073 (red danger, yellow abnormal, green normal, blue an act is asked for, white neutral).
  it.each([
    ["Fault", "red"],
    ["EmergencyStop", "red"],
    ["MaintenanceRequired", "yellow"],
    ["OFF_SPEC", "yellow"],
    ["Running", "green"],
    ["SetUp", "blue"],
    ["Stopped", "white"],
  ])("%s lights %s", (state, lamp) => {
    expect(proposeLamp(state)).toBe(lamp);
  });
});
