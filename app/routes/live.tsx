import type { Route } from "./+types/live";
import { assertMay, mayDo, requireUser } from "~/auth/caller.server";
import { ServerList } from "~/components/live/server-list";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { readLivePage } from "~/presenters/live-page.server";

export const meta: Route.MetaFunction = () => [{ title: "Live · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return { ...(await readLivePage(organizationId)), mayRun: mayDo(caller, "test-server.run", organizationId) };
}

export default function Live({ loaderData }: Route.ComponentProps) {
  return <ServerList {...loaderData} />;
}
