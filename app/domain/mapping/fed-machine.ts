/** A machine's running mapping behind one function: what came of a source goes in, what changed comes out. */
import { fail, ok, problem, type Result } from "../core/result";
import type { Direction } from "../iodd/device-description";
import { toProcessDataImage } from "../iodd/process-data-schema";
import { findConversion } from "./find-conversion";
import type { Mapping } from "./mapping";
import type { Role } from "./mapping-parts";
import { MappingRunner, type Update } from "./mapping-runner";
import { planMapping } from "./plan-mapping";
import type { FeedInput } from "./plan-readings";
import type { TargetRanges } from "./row-quality";

/** Everything that running one machine needs, as plain data that travels between processes. */
export type FedMachineSpec = {
  readonly machine: string;
  readonly mapping: Mapping;
  readonly layouts: readonly { readonly role: string; readonly direction: Direction; readonly image: NonNullable<NonNullable<Role["layouts"]>["in"]>; readonly profileCharacteristic: readonly number[] }[];
  readonly ranges: Readonly<Record<string, TargetRanges>>;
  /** Roles without a source. */
  readonly unbound: readonly string[];
};

/** Problems: those of `planMapping`. */
export function startMachine(spec: FedMachineSpec, time: number): Result<MappingRunner> {
  const plan = planMapping(spec.mapping, {
    findConversion,
    findLayout: (role, direction) => {
      const layout = spec.layouts.find((l) => l.role === role && l.direction === direction);
      if (!layout) return fail(problem("mapping.no-device", { role }));
      return ok({ image: toProcessDataImage(layout.image), profileCharacteristic: layout.profileCharacteristic });
    },
    findRanges: (target) => spec.ranges[target],
  });
  if (!plan.ok) return plan;
  const runner = new MappingRunner(plan.value, time);
  for (const role of spec.unbound) runner.setRoleState(role, "not-connected", true, time);
  return ok(runner);
}

export function offerInput(runner: MappingRunner, input: FeedInput): Update[] {
  switch (input.kind) {
    case "frame":
      return runner.offerFrame(input.role, input.direction, input);
    case "sample":
      return runner.offerSample(input.channel, input);
    case "role":
      return runner.setRoleState(input.role, input.state, input.holds, input.time);
  }
}
