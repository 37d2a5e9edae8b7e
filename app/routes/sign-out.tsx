import { redirect } from "react-router";
import type { Route } from "./+types/sign-out";
import { requireUser } from "~/auth/caller.server";
import { endSession } from "~/auth/session.server";

export async function action({ request }: Route.ActionArgs) {
  await requireUser(request);
  return redirect("/sign-in", { headers: await endSession(request) });
}

export function loader() {
  return redirect("/");
}
