import { useMemo, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Problem } from "~/domain/core/result";
import { planTypeMapping } from "~/domain/mapping/run-check-cases";
import { TraceBench } from "~/domain/mapping/trace-row";
import { readFields } from "../frames/read-fields";
import { listPoints, noInputs, toFrameId, toTraceInputs, type BenchInputs, type BenchPoint } from "./bench-inputs";
import { toReadings, type NodeReading } from "./bench-readings";
import { viewRoleFrame } from "./view-role-frame";
import type { MappingScene } from "./mapping-scene";
import type { FrameState } from "./role-block";

export type BenchState = {
  readonly inputs: BenchInputs;
  readonly setInputs: (change: (before: BenchInputs) => BenchInputs) => void;
  readonly points: readonly BenchPoint[];
  /** By row id. */
  readonly readings: ReadonlyMap<string, NodeReading>;
  /** By role and direction, for the rulers. */
  readonly frames: ReadonlyMap<string, FrameState>;
  /** What keeps the mapping from running, and frames of another length. */
  readonly problems: readonly Problem[];
};

/** The bench of a type: what is laid on it goes through the very functions that run a machine. */
export function useBench(space: AddressSpace, scene: MappingScene): BenchState {
  const [inputs, setInputs] = useState<BenchInputs>(noInputs);
  const plan = useMemo(() => planTypeMapping(space, scene.type), [space, scene.type]);
  const points = useMemo(() => listPoints(scene), [scene]);
  return useMemo(() => {
    const traced = toTraceInputs(inputs, points);
    const isEmpty = traced.frames.length === 0 && traced.samples.length === 0;
    const bench = plan.ok && !isEmpty ? new TraceBench(plan.value) : undefined;
    const readings = bench ? toReadings(scene, bench.offer(traced)) : new Map<string, NodeReading>();
    const frames = new Map(
      traced.frames.map(({ role, direction, octets }): [string, FrameState] => {
        const known = scene.roles.get(role);
        const view = known && viewRoleFrame(known, direction);
        const read = view && readFields(view, octets);
        return [toFrameId(role, direction), { octets, readings: read?.ok ? read.readings : undefined }];
      }),
    );
    return { inputs, setInputs, points, readings, frames, problems: plan.ok ? (bench?.problems ?? []) : plan.problems };
  }, [inputs, plan, points, scene]);
}
