import { data, redirect } from "react-router";
import type { Route } from "./+types/library";
import { assertMay, mayDo, requireUser } from "~/auth/caller.server";
import { LibraryView } from "~/components/library/library-view";
import { formatProblem } from "~/domain/core/problem-texts";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { removeFromLibrary } from "~/services/import-model.server";
import { listLibraryChoices } from "~/services/list-library-choices.server";

export const meta: Route.MetaFunction = () => [{ title: "Library · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return {
    entries: await listLibraryChoices(organizationId),
    mayEdit: mayDo(caller, "model.edit", organizationId),
    shown: new URL(request.url).searchParams.get("model") ?? undefined,
  };
}

export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "model.edit", organizationId);
  const upload = (await request.formData()).get("upload");
  const result = await removeFromLibrary(caller, organizationId, typeof upload === "string" ? upload : "");
  return result.ok
    ? redirect("/library")
    : data({ refusal: result.problems.map(formatProblem).join(" ") }, { status: 409 });
}

export default function Library({ loaderData, actionData }: Route.ComponentProps) {
  return (
    <LibraryView
      entries={loaderData.entries}
      shown={loaderData.shown}
      editBlockedBy={loaderData.mayEdit ? undefined : "asks for the role engineer or administrator"}
      refusal={actionData?.refusal}
    />
  );
}
