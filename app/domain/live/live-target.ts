/** A server that Live looks at: one of our test servers, or an endpoint that the team named. */
import type { TestServerState } from "../simulation/test-server-state";

export type LiveTarget = {
  readonly kind: "test-server" | "endpoint";
  readonly id: string;
  readonly organizationId: string;
  readonly name: string;
  readonly endpointUrl: string | null;
  /** Whether it can be asked: an endpoint always, a test server while it runs. */
  readonly isOpen: boolean;
  /** What it is doing, in a word, where it cannot be asked. */
  readonly phase: string;
  readonly isProtected: boolean;
  /** Mode of the messages, as OPC UA names it. */
  readonly securityMode: "None" | "Sign" | "SignAndEncrypt";
  /** The node to begin at. */
  readonly landingNode: string | null;
  /** The model that a test server serves. */
  readonly modelId: string | null;
};

export function toLiveTarget(server: TestServerState): LiveTarget {
  const isProtected = server.security.includes("basic256sha256");
  return {
    kind: "test-server",
    id: server.id,
    organizationId: server.organizationId,
    name: server.modelName,
    endpointUrl: server.endpointUrl,
    isOpen: server.state === "running",
    phase: server.state,
    isProtected,
    securityMode: isProtected ? "SignAndEncrypt" : "None",
    landingNode: server.landingNode,
    modelId: server.modelId,
  };
}
