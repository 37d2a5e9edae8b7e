import type { ShouldRevalidateFunctionArgs } from "react-router";
import type { Route } from "./+types/live.$testServerId";
import { mayDo, requireUser } from "~/auth/caller.server";
import { LiveView } from "~/components/live/live-view";
import { requireLiveTarget } from "~/services/live-target.server";

export const meta: Route.MetaFunction = ({ loaderData }) => [{ title: `Live: ${loaderData?.target.name ?? "gone"} · Ferrule` }];

export async function loader({ request, params }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const target = await requireLiveTarget(caller, params.testServerId, "read");
  const mayWrite = mayDo(caller, target.kind === "test-server" ? "test-server.write" : "endpoint.write", target.organizationId);
  return { target, mayWrite, startNode: new URL(request.url).searchParams.get("node") ?? target.landingNode };
}

/** The node in the address changes with every selection; only another server asks anew. */
export function shouldRevalidate({ currentParams, nextParams }: ShouldRevalidateFunctionArgs) {
  return currentParams.testServerId !== nextParams.testServerId;
}

export default function LiveServer({ loaderData }: Route.ComponentProps) {
  return <LiveView key={loaderData.target.id} target={loaderData.target} startNode={loaderData.startNode} mayWrite={loaderData.mayWrite} />;
}
