/**
 * Sets the Variables of the plan in motion. A value is computed when somebody reads or samples it, never by a timer, so
 * that a park of thousands of Variables costs nothing while nobody looks.
 */
import { type AddressSpace, DataValue, NodeClass, type StatusCode, StatusCodes, type UAVariable, Variant } from "node-opcua";
import { simulateNumber } from "~/domain/simulation/simulate-value";
import type { SimulatedVariable } from "~/domain/simulation/plan-simulation";
import { toWireNodeId } from "../node-ids";
import { encodeNumber, makePlainValue, makeVariant } from "./encode-value";

export type BoundSimulation = {
  moving: number;
  fixed: number;
  /** NodeIds of the plan that the server does not have. */
  missing: string[];
  /** Variables that would not take a value; they stay as the model's file left them. */
  refused: { nodeId: string; detail: string }[];
};

/** Fastest useful sampling of a simulated value, ms; slower than that only when the model says so. */
const MINIMUM_SAMPLING_INTERVAL = 100;

/**
 * @param fillsGaps false on a server with live values: what the model leaves open stays without a value
 * @param now the clock, ms since 1970; the simulation's time is the time of day, so that a restart goes on where it would be
 */
export function bindSimulation(
  space: AddressSpace,
  plan: readonly SimulatedVariable[],
  quality: "uncertain" | "good",
  now: () => number,
  fillsGaps = true,
): BoundSimulation {
  const status = quality === "good" ? StatusCodes.Good : StatusCodes.UncertainSimulatedValue;
  const namespaces = space.getNamespaceArray().map((namespace) => namespace.namespaceUri);
  const bound: BoundSimulation = { moving: 0, fixed: 0, missing: [], refused: [] };
  for (const entry of plan) {
    const id = toWireNodeId(entry.nodeId, namespaces);
    const node = id.ok ? space.findNode(id.value) : null;
    if (node?.nodeClass !== NodeClass.Variable) {
      bound.missing.push(entry.nodeId);
      continue;
    }
    // One odd Variable must not keep a whole park from being served.
    try {
      if (entry.motion.kind === "static") {
        holdValue(space, node as UAVariable, entry, fillsGaps ? status : undefined, new Date(now()));
        bound.fixed++;
      } else {
        moveValue(node as UAVariable, entry, status, now);
        bound.moving++;
      }
    } catch (error) {
      bound.refused.push({ nodeId: entry.nodeId, detail: error instanceof Error ? error.message : String(error) });
    }
  }
  return bound;
}

function moveValue(variable: UAVariable, entry: SimulatedVariable, status: StatusCode, now: () => number): void {
  const { motion, builtInType, dimensions } = entry;
  if (motion.kind === "static") return;
  let forced: DataValue | undefined;
  variable.bindVariable(
    {
      timestamped_get: () => {
        if (forced) return forced;
        const at = now();
        const value = makeVariant(builtInType, dimensions, (offset) =>
          motion.kind === "clock" ? new Date(at) : encodeNumber(simulateNumber(motion, at / 1000, offset), builtInType),
        );
        return new DataValue({ value, statusCode: status, sourceTimestamp: new Date(at), serverTimestamp: new Date(at) });
      },
      // What a client writes stays, marked as forced by hand, until the server stops.
      timestamped_set: async (written: DataValue) => {
        const at = new Date(now());
        forced = new DataValue({ value: written.value, statusCode: StatusCodes.GoodLocalOverride, sourceTimestamp: at, serverTimestamp: at });
        return StatusCodes.Good;
      },
    },
    true,
  );
  variable.minimumSamplingInterval = Math.max(variable.minimumSamplingInterval, MINIMUM_SAMPLING_INTERVAL);
}

/** Keeps the model's value. What the model leaves open gets a plain value; a Property with a value describes and stays Good. */
function holdValue(space: AddressSpace, variable: UAVariable, entry: SimulatedVariable, status: StatusCode | undefined, at: Date): void {
  if (entry.hasValue) {
    if (!entry.isProperty) variable.setValueFromSource(variable.readValue().value, status ?? StatusCodes.Good, at);
    return;
  }
  if (status === undefined) {
    // OPC 10000-4 §7.11.5: a Variable that nothing feeds has no value.
    if (!entry.isProperty) variable.setValueFromSource(new Variant({}), StatusCodes.BadNoValue, at);
    return;
  }
  const dataType = entry.builtInType === "ExtensionObject" ? space.findDataType(variable.dataType) : null;
  const element = makePlainValue(space, entry.builtInType, dataType, at);
  if (element === undefined) {
    variable.setValueFromSource(new Variant({}), StatusCodes.BadNoValue, at);
    return;
  }
  const lengths = entry.dimensions.length === 0 ? [] : entry.dimensions;
  variable.setValueFromSource(makeVariant(entry.builtInType, lengths, () => element), status, at);
}
