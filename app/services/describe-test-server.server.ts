/** Test servers as the API answers them; the shape is part of the OpenAPI document. */
import { z } from "zod";
import type { LogLine, TestServerState } from "../domain/simulation/test-server-state";
import { toProblemJson } from "../utils/problem-response.server";

export const testServerAnswerSchema = z.object({
  id: z.string(),
  modelId: z.string(),
  state: z.enum(["starting", "running", "stopping", "stopped", "failed", "lost"]),
  stage: z.enum(["files", "process", "certificate", "nodesets", "simulation", "endpoint"]).nullable(),
  endpointUrl: z.string().nullable(),
  startedAt: z.iso.datetime(),
  runningAt: z.iso.datetime().nullable(),
  applicationName: z.string(),
  applicationUri: z.string(),
  security: z.array(z.enum(["basic256sha256", "none"])),
  simulatedQuality: z.enum(["uncertain", "good"]),
  tokens: z.object({ anonymous: z.boolean(), userName: z.string(), password: z.string() }),
  certificateThumbprint: z.string().nullable(),
  sessions: z.number().int(),
  feed: z
    .object({ inputs: z.int(), changes: z.int(), delay: z.object({ p50: z.number(), p99: z.number(), highest: z.number() }).nullable() })
    .nullable()
    .meta({ description: "What live sources fed since the start, and its delay over the last second in ms; null for a simulation." }),
  problems: z.array(z.object({ code: z.string(), severity: z.string(), message: z.string() }).loose()),
  log: z.array(z.object({ at: z.iso.datetime(), level: z.string(), text: z.string() })).optional(),
});
export type TestServerAnswer = z.infer<typeof testServerAnswerSchema>;

export function describeTestServer(server: TestServerState, log?: readonly LogLine[]): TestServerAnswer {
  const { id, modelId, state, stage, endpointUrl, startedAt, runningAt, applicationName, applicationUri } = server;
  return {
    id,
    modelId,
    state,
    stage,
    endpointUrl,
    startedAt,
    runningAt,
    applicationName,
    applicationUri,
    security: [...server.security],
    simulatedQuality: server.simulatedQuality,
    tokens: server.tokens,
    certificateThumbprint: server.certificateThumbprint,
    sessions: server.sessions.length,
    feed: server.feed && { ...server.feed },
    problems: server.problems.map(toProblemJson),
    ...(log ? { log: log.map((line) => ({ ...line })) } : {}),
  };
}
