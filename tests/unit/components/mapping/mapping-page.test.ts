import { describe, expect, it } from "vitest";
import {
  listPoints,
  makeCheckCase,
  fromCheckCase,
  toTraceInputs,
  type BenchInputs,
} from "~/components/mapping/bench-inputs";
import { toReadings } from "~/components/mapping/bench-readings";
import { describeSource, feedOf } from "~/components/mapping/describe-source";
import { describeChain, describeTransform } from "~/components/mapping/describe-transform";
import { countMapped, groupMembers, makeMappingScene } from "~/components/mapping/mapping-scene";
import { formatFigure, parseFigure } from "~/components/mapping/parse-figure";
import { parseRecording } from "~/components/mapping/parse-recording";
import { routeWires, type WireEnds } from "~/components/mapping/route-wires";
import { listStations } from "~/components/mapping/row-stations";
import { parsePoints } from "~/components/mapping/transform-editor";
import { getValue } from "~/domain/core/result";
import { planTypeMapping } from "~/domain/mapping/run-check-cases";
import { TraceBench } from "~/domain/mapping/trace-row";
import { braiderType, makeMappedBraiderSpace } from "../../../support/demo-mapping";

const space = makeMappedBraiderSpace();
const scene = makeMappingScene(space, braiderType);
const find = (path: string) => {
  const member = scene.members.find((one) => one.target.path === path);
  if (!member?.row) throw new RangeError(path);
  return { ...member, row: member.row };
};

describe("the drawing of a mapping", () => {
  it("shows what feeds what", () => {
    expect(groupMembers(scene.members).map(({ group }) => group)).toEqual([
      "Process",
      "Environment",
      "Configuration",
      "Energy",
      "Status",
    ]);
    expect(scene.roleViews[0]?.name).toBe("creel sensor");
    expect([...(scene.roleViews[0]?.fed.get("in/1") ?? [])].map((member) => member.target.path)).toEqual([
      "Process/CreelDistance",
      "Process/CreelFill",
    ]);
    const { mapped, all } = countMapped(scene.members);
    expect(mapped).toBeGreaterThan(20);
    expect(all).toBeGreaterThanOrEqual(mapped);
  });

  it("says sources and steps in few words", () => {
    expect(describeSource(find("Process/CreelDistance").row.source, scene.roles)).toBe("creel sensor · Distance");
    expect(describeSource(find("Process/SpindleSpeed").row.source, scene.roles)).toBe(
      "controller · holding register 10",
    );
    expect(describeSource(find("Process/CarriageDeviation").row.source, scene.roles)).toBe("= position − setpoint");
    expect(describeSource(find("Configuration/SensorTag").row.source, scene.roles)).toBe("creel sensor · parameter 24");
    expect(feedOf(undefined)).toBe("open");
    expect(feedOf({ source: { kind: "constant", value: 1 }, transforms: [] })).toBe("constant");
    expect(describeTransform({ kind: "linear", gradient: 0.1, offset: -40 })).toBe("× 0.1 − 40");
    expect(describeTransform({ kind: "unit", from: "MMT", to: "MTR" })).toBe("mm → m");
    expect(describeChain(find("Process/CreelFill").row.transforms)).toBe("table, 2 points");
  });

  it("leads from the bits to the node", () => {
    const { row, target } = find("Process/CreelFill");
    expect(listStations(row, target, scene.roles).map(({ title, note }) => `${title}: ${note}`)).toEqual([
      "Octets 0 … 1: bits 31 … 16",
      "Read as: Int16",
      expect.stringMatching(/^Named values: −32\s760 Out of range/) as string,
      "Scale: × 0.1, mm, from the IODD",
      "Lookup table: table, 2 points",
      "Node: Process/CreelFill, Float",
    ]);
  });
});

describe("wires", () => {
  const wire = (id: string, x: number, row: number, terminalY: number): WireEnds => ({
    id,
    x,
    y: row - 10,
    tracksTop: row,
    terminalX: 500,
    terminalY,
  });

  it("never share a track, below a row or in the gutter", () => {
    const wires = routeWires(
      [wire("a", 40, 100, 20), wire("b", 90, 100, 300), wire("c", 60, 200, 60), wire("d", 20, 200, 400)],
      { left: 300, right: 400 },
    );
    const parts = wires.map(({ path }) => /^M\S+ \S+V(\S+?)H(\S+?)V(\S+?)H500$/.exec(path));
    expect(parts.every(Boolean)).toBe(true);
    expect(new Set(parts.map((part) => part?.[1])).size).toBe(4);
    expect(new Set(parts.map((part) => part?.[2])).size).toBe(4);
  });

  it("do not cross where two fields of a row feed the members in their order", () => {
    const wires = routeWires([wire("left", 40, 100, 320), wire("right", 90, 100, 300)], { left: 300, right: 400 });
    const columnOf = (id: string) => Number(/H([\d.]+)V/.exec(wires.find((one) => one.id === id)?.path ?? "")?.[1]);
    // The right field leaves on the higher track; both go down, so its column stands further right.
    expect(columnOf("right")).toBeGreaterThan(columnOf("left"));
  });
});

describe("the bench", () => {
  const inputs: BenchInputs = {
    frames: {
      "creel sensor\nin": { text: "09 C4 FC 03", isValid: true },
      "carriage sensor\nin": { text: "nonsense", isValid: true },
    },
    samples: {},
  };
  const points = listPoints(scene);

  it("reads what can be read and leaves the rest out", () => {
    expect(toTraceInputs(inputs, points).frames.map(({ role, octets }) => [role, [...octets]])).toEqual([
      ["creel sensor", [9, 196, 252, 3]],
    ]);
    expect(points.map((point) => point.label)).toContain("meter · input register 0");
  });

  it("gives nodes with the values of their steps, and a check case that gives them again", () => {
    const bench = new TraceBench(getValue(planTypeMapping(space, braiderType)));
    const readings = toReadings(scene, bench.offer(toTraceInputs(inputs, points)));
    // 0x09C4 = 2500, × 0.1 = 250 mm; (380 − 250) / 320 = 40.625 % (table of the scenario).
    const fill = readings.get(find("Process/CreelFill").id);
    expect([fill?.text, fill?.unit, fill?.status]).toEqual(["40.63", "%", "Good"]);
    expect([...(fill?.stations ?? [])].map(([key, { text, unit }]) => `${key} ${text} ${unit}`.trim())).toEqual([
      "node 40.63 %",
      "bits 09 C4",
      "raw 2500",
      "special none met",
      "scaled 250 mm",
      "step 0 40.625",
    ]);
    const value = makeCheckCase("half", inputs, scene, readings);
    expect(value.frames).toEqual([{ role: "creel sensor", direction: "in", hex: "09 C4 FC 03" }]);
    expect(value.expected.find((one) => one.target === find("Process/CreelFill").target.target)).toMatchObject({
      value: 40.625,
      status: 0,
    });
    expect(fromCheckCase(value).frames).toEqual({ "creel sensor\nin": { text: "09 C4 FC 03", isValid: true } });
  });
});

describe("a recorded file", () => {
  it("is read with a head in any order, or without one", () => {
    const read = (text: string) =>
      getValue(parseRecording(text)).map(({ time, port, octets, line }) => [time, port, [...octets], line]);
    expect(read("time;port;hex\n12:00:00;1;04 D2\n")).toEqual([["12:00:00", "1", [4, 210], 2]]);
    expect(read('port,hex,time\r\n1,"04D2",t1')).toEqual([["t1", "1", [4, 210], 2]]);
    expect(read("t1\t3\t0A5B")).toEqual([["t1", "3", [10, 91], 1]]);
  });

  it("says which line is wrong, and ends at its limit", () => {
    const codes = (text: string) =>
      parseRecording(text).problems.map(({ code, at }) => `${code} ${at?.line ?? ""}`.trim());
    expect(codes("")).toEqual(["recording.empty"]);
    expect(codes("time,port,hex\n1,2")).toEqual(["recording.columns 2"]);
    expect(codes("time,port,hex\n1,2,0G\n1,2,00")).toEqual(["recording.hex 2"]);
    expect(codes("a,1,00\n".repeat(200_001))).toEqual(["recording.too-long 200001"]);
  });
});

describe("figures", () => {
  it("are read as people write them", () => {
    expect(["−0,5", "1 000", "0x1F", "2.5e3", ".5"].map(parseFigure)).toEqual([-0.5, 1000, 31, 2500, 0.5]);
    expect(["", "1,2,3", "abc", "1e999"].map(parseFigure)).toEqual([undefined, undefined, undefined, undefined]);
    expect(formatFigure(-0.016666667)).toBe("−0.016666667");
  });

  it("make a lookup table of two columns, however they are parted", () => {
    expect(parsePoints("60\t100\n380\t0\n")).toEqual([
      [60, 100],
      [380, 0],
    ]);
    expect(parsePoints("60; 100\n380; 0")).toEqual([
      [60, 100],
      [380, 0],
    ]);
    expect(parsePoints("60 100")).toBeUndefined();
    expect(parsePoints("60 100\n380")).toBeUndefined();
  });
});
