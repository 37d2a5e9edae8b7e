/** One as-built comparison over an open connection: read whole, watched for a while, judged. Knows no database. */
import { AddressSpace, type Layer } from "../domain/address-space/address-space";
import { getPath } from "../domain/address-space/browse";
import { getAccessLevel } from "../domain/address-space/node";
import { formatNodeId, type NodeKey } from "../domain/address-space/node-id";
import type { AsBuiltComparison, AsBuiltDifference, AsBuiltTolerance, Observation, ServedModel } from "../domain/as-built/as-built";
import { compareAsBuilt } from "../domain/as-built/compare-as-built";
import { formatProblem } from "../domain/core/problem-texts";
import { isInstance } from "../domain/simulation/is-instance";
import { getLibrary } from "../library/library.server";
import type { EndpointClient } from "../opcua/client/endpoint-client.server";
import type { ObserveTarget } from "../opcua/client/observe.server";
import type { LiveAddressSpace } from "../opcua/client/read-address-space.server";

export type CompareEndpointOptions = {
  readonly tolerance: AsBuiltTolerance;
  /** 0: values are not watched. */
  readonly watchSeconds: number;
  /** What the mapping promises, ms by NodeId text. */
  readonly promisedPeriods?: ReadonlyMap<string, number>;
  /** What was found beside the address space, such as foreign devices on the ports. */
  readonly findMore?: () => Promise<{ readonly differences: readonly AsBuiltDifference[]; readonly remarks: readonly string[] }>;
  readonly onProgress?: (stage: "browse" | "watch" | "compare", done: number, of: number) => void;
};

export type EndpointComparison = {
  readonly comparison: AsBuiltComparison;
  readonly observations: readonly Observation[];
  readonly servedNodes: number;
  /** What kept the comparison from being complete, as sentences. */
  readonly remarks: readonly string[];
};

/** Variables watched in one run; a hall has fewer. */
const MAX_WATCHED = 5_000;

/** Throws when the server does not answer. */
export async function compareEndpoint(space: AddressSpace, client: EndpointClient, options: CompareEndpointOptions): Promise<EndpointComparison> {
  const [{ readAddressSpace }, { observeVariables }, { readServedModels }] = await Promise.all([
    import("../opcua/client/read-address-space.server"),
    import("../opcua/client/observe.server"),
    import("../opcua/client/read-served-models.server"),
  ]);
  const { onProgress } = options;
  const teamLayers = listTeamLayers(space);
  const models = await readServedModels(client);
  const read = await readAddressSpace(client, {
    namespaceUris: teamLayers.flatMap((layer) => layer.header.models.map((m) => m.modelUri)),
    layers: space.layers.slice(0, -1),
    onProgress: ({ done, found }) => onProgress?.("browse", done, found),
  });
  if (!read.ok) throw new Error(read.problems.map(formatProblem).join(" "));
  const milliseconds = options.watchSeconds * 1000;
  const targets = listWatched(space, options.promisedPeriods);
  const observations = milliseconds > 0 ? await observeVariables(client, targets, { milliseconds, onProgress: (done, of) => onProgress?.("watch", done, of) }) : [];
  onProgress?.("compare", 0, 1);
  const more = await options.findMore?.();
  const comparison = compareLayers(space, teamLayers, read.value, models, observations, more?.differences ?? [], options.tolerance);
  return { comparison, observations, servedNodes: read.value.nodes.length, remarks: [...read.problems.map(formatProblem), ...(more?.remarks ?? [])] };
}

/** The layers that the team wrote itself, the own one last: what is published elsewhere is compared by its version alone. */
function listTeamLayers(space: AddressSpace): Layer[] {
  const published = new Set(getLibrary().list().map((entry) => entry.modelUri));
  return space.layers.filter((layer) => layer === space.own || (layer.header.models[0] !== undefined && !published.has(layer.header.models[0].modelUri)));
}

function listWatched(space: AddressSpace, promised: ReadonlyMap<string, number> | undefined): ObserveTarget[] {
  const known = new Map<NodeKey, boolean>();
  return space
    .listOwnNodes()
    .filter((node) => node.nodeClass === "Variable" && (getAccessLevel(node) & 1) === 1 && isInstance(space, node.key, known) && !isPropertyOf(space, node.key))
    .slice(0, MAX_WATCHED)
    .map((node) => {
      const nodeId = formatNodeId(node.nodeId);
      const promisedPeriod = promised?.get(nodeId);
      return { nodeId, path: getPath(space, node.key), ...(promisedPeriod === undefined ? {} : { promisedPeriod }) };
    });
}

function isPropertyOf(space: AddressSpace, key: NodeKey): boolean {
  return space.edgesTo(key).some((edge) => edge.type === "i=46");
}

function compareLayers(
  space: AddressSpace,
  teamLayers: readonly Layer[],
  served: LiveAddressSpace,
  models: readonly ServedModel[],
  observations: readonly Observation[],
  more: readonly AsBuiltDifference[],
  tolerance: AsBuiltTolerance,
): AsBuiltComparison {
  const parts = teamLayers.map((layer, i) => {
    const isLast = i === teamLayers.length - 1;
    return compareAsBuilt({
      released: AddressSpace.of(space.layers.slice(0, space.layers.indexOf(layer)), layer),
      releasedModels: isLast ? space.layers.flatMap((l) => l.header.models.slice(0, 1)) : [],
      served: { nodes: served.nodes, models, isComplete: served.isComplete },
      observations: isLast ? observations : [],
      more: isLast ? more : [],
      tolerance,
    });
  });
  const sum = (name: keyof AsBuiltComparison["counts"]): number => parts.reduce((total, part) => total + part.counts[name], 0);
  const counts = { nodes: sum("nodes"), counted: sum("counted"), ignored: sum("ignored") };
  return {
    verdict: counts.counted > 0 ? "differs" : served.isComplete ? "as released" : "not shown",
    differences: parts.flatMap((part) => part.differences),
    counts,
  };
}
