import type { ShouldRevalidateFunctionArgs } from "react-router";
import type { Route } from "./+types/sources";
import { assertMay, mayDo, requireUser } from "~/auth/caller.server";
import { SourcesView } from "~/components/sources/sources-view";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { listSourceFindings } from "~/services/list-source-findings.server";
import { listDevices } from "~/services/read-devices.server";
import { readSources } from "~/services/read-sources.server";

/** What is open stands in the address; that alone asks for nothing new. */
export function shouldRevalidate({ currentUrl, nextUrl, defaultShouldRevalidate }: ShouldRevalidateFunctionArgs) {
  const isSamePage = currentUrl.pathname === nextUrl.pathname;
  return defaultShouldRevalidate && !(isSamePage && currentUrl.search !== nextUrl.search);
}

export const meta: Route.MetaFunction = () => [{ title: "Sources · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  const [sources, devices, findings] = await Promise.all([
    readSources(organizationId),
    listDevices(organizationId),
    listSourceFindings(organizationId),
  ]);
  return { sources, devices, findings, mayEdit: mayDo(caller, "mapping.edit", organizationId) };
}

export default function SourcesRoute({ loaderData }: Route.ComponentProps) {
  return <SourcesView {...loaderData} />;
}
