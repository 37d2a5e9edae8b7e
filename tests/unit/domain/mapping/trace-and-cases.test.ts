import { describe, expect, it } from "vitest";
import { getValue } from "~/domain/core/result";
import { applyOperations } from "~/domain/editing/apply-operation";
import { parseHex } from "~/domain/mapping/bits";
import { findConversion } from "~/domain/mapping/find-conversion";
import { findTargetByPath } from "~/domain/mapping/list-targets";
import { formatMiss, runCheckCases } from "~/domain/mapping/run-check-cases";
import { traceMapping } from "~/domain/mapping/trace-row";
import { makeRoleLayouts, toMapping } from "~/domain/mapping/type-mapping";
import { readPart } from "~/domain/mapping/mapping-entries";
import { braiderType, makeMappedBraiderSpace } from "../../../support/demo-mapping";

const space = makeMappedBraiderSpace();

describe("the decode bench", () => {
  it("shows each step from the bits to the node", () => {
    const octets = parseHex("08 98 FC 00") ?? new Uint8Array();
    const traced = getValue(
      traceMapping(
        toMapping(space, braiderType),
        { findConversion, findLayout: makeRoleLayouts(space, braiderType) },
        { frames: [{ role: "creel sensor", direction: "in", octets }], samples: [] },
      ),
    );
    // 0x0898 = 2200; gradient 0.1 mm (scenario); halfway between 60 mm full and 380 mm empty.
    const fill = traced.find((t) => t.target === "Process/CreelFill");
    expect(fill?.steps.map((s) => [s.kind, s.value, s.unit])).toEqual([
      ["bits", null, ""],
      ["raw", 2200, ""],
      ["scaled", 220, "mm"],
      ["transform", 50, ""],
      ["node", 50, ""],
    ]);
    expect(fill?.steps[0]?.text).toBe("octets 0 … 1, bits 16 … 31: 08 98");
  });

  it("warns of a frame of another length and gives Bad, never 0", () => {
    const traced = traceMapping(
      toMapping(space, braiderType),
      { findConversion, findLayout: makeRoleLayouts(space, braiderType) },
      { frames: [{ role: "creel sensor", direction: "in", octets: Uint8Array.of(8, 152) }], samples: [] },
    );
    expect(traced.problems.map((p) => p.code)).toEqual(["decode.length"]);
    const distance = getValue(traced).find((t) => t.target === "Process/CreelDistance");
    expect(distance).toMatchObject({ value: null, status: 0x80890000 });
  });
});

describe("check cases", () => {
  it("of the demo all hold", () => {
    const results = getValue(runCheckCases(space, braiderType));
    expect(results.length).toBeGreaterThan(2);
    expect(results.flatMap((r) => [...r.misses.map(formatMiss), ...r.problems.map((p) => p.code)])).toEqual([]);
  });

  it("name what came out otherwise", () => {
    const target = findTargetByPath(space, braiderType, "Process/CreelDistance")?.target ?? "";
    const row = readPart(space, "row", braiderType, target);
    if (!row) throw new RangeError("No row");
    const changed = { ...row, transforms: [{ kind: "linear" as const, gradient: 2, offset: 0 }] };
    const other = getValue(applyOperations(space, [{ kind: "setMapping", part: "row", owner: braiderType, id: target, value: changed }]));
    const misses = getValue(runCheckCases(other, braiderType)).flatMap((r) => r.misses.map(formatMiss));
    expect(misses).toEqual(["Process/CreelDistance: expected 220 Good, got 440 Good"]);
  });
});
