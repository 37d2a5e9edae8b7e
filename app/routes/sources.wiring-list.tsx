import type { Route } from "./+types/sources.wiring-list";
import { assertMay, requireUser } from "~/auth/caller.server";
import { WiringView } from "~/components/sources/wiring-view";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { readSources } from "~/services/read-sources.server";

export const meta: Route.MetaFunction = () => [{ title: "Wiring list · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId, organizationName } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return {
    sources: await readSources(organizationId),
    organization: organizationName,
    printedAt: new Date().toISOString().slice(0, 10),
  };
}

export default function WiringList({ loaderData }: Route.ComponentProps) {
  return <WiringView {...loaderData} />;
}
