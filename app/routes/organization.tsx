import { redirect } from "react-router";
import type { Route } from "./+types/organization";
import { isMember, requireUser } from "~/auth/caller.server";
import { formatOrganizationCookie } from "~/presenters/chosen-organization.server";
import { failWith } from "~/utils/problem-response.server";

/** Chooses which organisation the listing pages show. */
export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const id = (await request.formData()).get("organization");
  if (typeof id !== "string" || !isMember(caller, id)) throw failWith(404, "request.not-found");
  return redirect("/", { headers: { "set-cookie": formatOrganizationCookie(id) } });
}

export function loader() {
  return redirect("/");
}
