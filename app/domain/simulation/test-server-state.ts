/** What is known of a test server from outside: plain data for pages, the event stream and the API. */
import type { Problem } from "../core/result";

export type TestServerPhase = "starting" | "running" | "stopping" | "stopped" | "failed" | "lost";

/** What happens between the press and the running server, in this order. */
export const TEST_SERVER_STAGES = [
  { id: "files", label: "Writing the model's files" },
  { id: "process", label: "Starting the process" },
  { id: "certificate", label: "Preparing the certificate" },
  { id: "nodesets", label: "Loading the NodeSets" },
  { id: "simulation", label: "Setting values in motion" },
  { id: "endpoint", label: "Opening the endpoint" },
] as const;

export type TestServerStage = (typeof TEST_SERVER_STAGES)[number]["id"];

/** What an endpoint offers. "none" is for a bench only. */
export type TestServerSecurity = "basic256sha256" | "none";

/** Status of simulated values: Uncertain_SimulatedValue as OPC 10000-8 asks, or Good for clients that refuse the other. */
export type SimulatedQuality = "uncertain" | "good";

export type LogLine = {
  /** ISO 8601, UTC. */
  readonly at: string;
  readonly level: "info" | "warning" | "error" | "output";
  readonly text: string;
};

export type TestServerSession = {
  readonly name: string;
  readonly user: string;
  readonly security: string;
  readonly since: string;
  readonly subscriptions: number;
  readonly monitoredItems: number;
};

/** Counts of what moves, for the page. */
export type SimulationCounts = { readonly moving: number; readonly fixed: number };

/** What live sources fed since the start, and how quickly it reached the Variables over the last second, ms. */
export type FeedState = {
  readonly inputs: number;
  readonly changes: number;
  readonly delay: { readonly p50: number; readonly p99: number; readonly highest: number } | null;
};

export type TestServerState = {
  readonly id: string;
  readonly organizationId: string;
  readonly modelId: string;
  readonly modelName: string;
  readonly state: TestServerPhase;
  readonly stage: TestServerStage | null;
  /** ISO 8601, UTC. */
  readonly startedAt: string;
  readonly runningAt: string | null;
  readonly endedAt: string | null;
  readonly endpointUrl: string | null;
  /** Names of instances that exist on the test server only, one of each type, because a model of types has none to watch. */
  readonly sampleInstances: readonly string[];
  /** Sequence number of the model that is served; a higher head means that the model has changed since. */
  readonly servedSeq: number | null;
  /** The node that Live opens at, `nsu=`: the first that moves. */
  readonly landingNode: string | null;
  readonly applicationName: string;
  readonly applicationUri: string;
  readonly security: readonly TestServerSecurity[];
  readonly simulatedQuality: SimulatedQuality;
  readonly tokens: { readonly anonymous: boolean; readonly userName: string; readonly password: string };
  readonly certificateThumbprint: string | null;
  readonly simulation: SimulationCounts | null;
  /** Null for a server that only simulates. */
  readonly feed: FeedState | null;
  /** Resident memory, MB, and share of one processor, 0 … 1; null until the process tells. */
  readonly load: { readonly memory: number; readonly processor: number } | null;
  readonly sessions: readonly TestServerSession[];
  readonly problems: readonly Problem[];
};
