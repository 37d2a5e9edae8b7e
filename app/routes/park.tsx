import type { Route } from "./+types/park";
import { assertMay, mayDo, requireUser } from "~/auth/caller.server";
import { ParkView } from "~/components/park/park-view";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { listTestServers } from "~/presenters/list-test-servers.server";
import { readPark } from "~/services/read-park.server";
import { readGatewayStates } from "~/services/read-release.server";
import { readReviews } from "~/services/read-review.server";
import { hidesSteps } from "~/utils/hidden-steps";

export const meta: Route.MetaFunction = () => [{ title: "Park · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId, organizationName, roles } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return {
    ...(await readPark(organizationId)),
    testServers: listTestServers(organizationId),
    reviews: (await readReviews(caller, organizationId)).filter(({ state }) => state !== "closed" && state !== "released"),
    gateways: await readGatewayStates(organizationId),
    organizationId,
    organizationName,
    userName: caller.name,
    roles,
    mayEdit: mayDo(caller, "model.edit", organizationId),
    showsSteps: !hidesSteps(request),
    now: new Date().toISOString(),
  };
}

export default function Park({ loaderData }: Route.ComponentProps) {
  return <ParkView park={loaderData} />;
}
