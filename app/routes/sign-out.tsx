import { redirect } from "react-router";
import type { Route } from "./+types/sign-out";
import { requireUser } from "~/auth/caller.server";
import { endSession } from "~/auth/session.server";
import { closeStreamsOf } from "~/services/event-hub.server";

export async function action({ request }: Route.ActionArgs) {
  const { userId } = await requireUser(request);
  const headers = await endSession(request);
  // Tabs of the session that ended are not let in again; those of other sessions come back by themselves.
  closeStreamsOf(userId);
  return redirect("/sign-in", { headers });
}

export function loader() {
  return redirect("/");
}
