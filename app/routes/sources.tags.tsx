import { redirect } from "react-router";
import type { Route } from "./+types/sources.tags";
import { assertMay, mayDo, requireUser } from "~/auth/caller.server";
import { TagsView } from "~/components/sources/tags-view";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { listTags, removeTagList } from "~/services/import-tags.server";
import { readSources } from "~/services/read-sources.server";
import { failWith } from "~/utils/problem-response.server";

export const meta: Route.MetaFunction = () => [{ title: "Controller tags · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  const [lists, { sources }] = await Promise.all([listTags(organizationId), readSources(organizationId)]);
  return {
    lists,
    sources: sources.map(({ id, name }) => ({ id, name })),
    mayEdit: mayDo(caller, "mapping.edit", organizationId),
  };
}

export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "mapping.edit", organizationId);
  const id = (await request.formData()).get("id");
  const removed = await removeTagList(organizationId, typeof id === "string" ? id : "");
  if (!removed.ok) throw failWith(404, "request.not-found");
  return redirect("/sources/tags");
}

export default function TagsRoute({ loaderData }: Route.ComponentProps) {
  return (
    <TagsView
      lists={loaderData.lists}
      sources={loaderData.sources}
      editBlockedBy={loaderData.mayEdit ? undefined : "asks for the role integrator, engineer or administrator"}
    />
  );
}
