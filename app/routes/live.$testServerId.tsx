import type { ShouldRevalidateFunctionArgs } from "react-router";
import type { Route } from "./+types/live.$testServerId";
import { mayDo, requireUser } from "~/auth/caller.server";
import { LiveView } from "~/components/live/live-view";
import { requireTestServer } from "~/services/find-test-server.server";

export const meta: Route.MetaFunction = ({ loaderData }) => [{ title: `Live: ${loaderData?.server.modelName ?? "gone"} · Ferrule` }];

export async function loader({ request, params }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const server = requireTestServer(caller, params.testServerId, "read");
  return { server, mayWrite: mayDo(caller, "test-server.write", server.organizationId), startNode: new URL(request.url).searchParams.get("node") ?? server.landingNode };
}

/** The node in the address changes with every selection; only another server asks anew. */
export function shouldRevalidate({ currentParams, nextParams }: ShouldRevalidateFunctionArgs) {
  return currentParams.testServerId !== nextParams.testServerId;
}

export default function LiveServer({ loaderData }: Route.ComponentProps) {
  return <LiveView key={loaderData.server.id} server={loaderData.server} startNode={loaderData.startNode} mayWrite={loaderData.mayWrite} />;
}
