import type { TestServerState } from "~/domain/simulation/test-server-state";
import type { Park } from "~/services/read-park.server";

/** All that the Park page shows. */
export type ParkData = Park & {
  readonly testServers: readonly TestServerState[];
  readonly organizationId: string;
  readonly organizationName: string;
  readonly userName: string;
  readonly roles: readonly string[];
  readonly mayEdit: boolean;
  readonly showsSteps: boolean;
  readonly now: string;
};
