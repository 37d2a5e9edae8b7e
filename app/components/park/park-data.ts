import type { TestServerState } from "~/domain/simulation/test-server-state";
import type { Park } from "~/services/read-park.server";
import type { GatewayState } from "~/services/read-release.server";
import type { ReviewLine } from "~/services/read-review.server";

/** All that the Park page shows. */
export type ParkData = Park & {
  readonly testServers: readonly TestServerState[];
  /** Those that are not decided yet. */
  readonly reviews: readonly ReviewLine[];
  readonly gateways: readonly GatewayState[];
  readonly organizationId: string;
  readonly organizationName: string;
  readonly userName: string;
  readonly roles: readonly string[];
  readonly mayEdit: boolean;
  readonly showsSteps: boolean;
  readonly now: string;
};
