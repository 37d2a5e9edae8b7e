import { requireCaller } from "~/auth/caller.server";
import { openEventStream } from "~/services/event-hub.server";
import type { Route } from "./+types/events";

export async function loader({ request }: Route.LoaderArgs): Promise<Response> {
  const caller = await requireCaller(request);
  // A tab that makes its stream anew cannot set the header, so it may say the same in the address.
  const seen = request.headers.get("last-event-id") ?? new URL(request.url).searchParams.get("after");
  return openEventStream(caller, request.signal, seen);
}
