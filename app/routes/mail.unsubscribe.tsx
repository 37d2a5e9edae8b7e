import { data, Form } from "react-router";
import type { Route } from "./+types/mail.unsubscribe";
import { Button } from "~/components/ui/button";
import { unsubscribeByMark } from "~/services/manage-outbox.server";
import { isMailKind, mailKinds } from "~/utils/mail-kinds";

export const meta: Route.MetaFunction = () => [{ title: "Stop mails · Ferrule" }];

/** The page behind the link of a mail; it changes nothing by being looked at. */
export function loader({ request }: Route.LoaderArgs) {
  const kind = new URL(request.url).searchParams.get("kind") ?? "";
  return { about: isMailKind(kind) ? mailKinds[kind] : null };
}

/** One press here or in the mail program (RFC 8058). The mark in the address says who; nobody has to sign in. */
export async function action({ request }: Route.ActionArgs) {
  const query = new URL(request.url).searchParams;
  const stopped = await unsubscribeByMark(query.get("user") ?? "", query.get("kind") ?? "", query.get("mark") ?? "");
  return data({ stopped: stopped !== undefined }, { status: stopped === undefined ? 404 : 200 });
}

export default function Unsubscribe({ loaderData, actionData }: Route.ComponentProps) {
  return (
    <main id="main" className="mx-auto grid max-w-120 gap-4 p-8">
      <h1 className="text-title font-semibold">Stop mails of this kind</h1>
      {actionData ? (
        <p role="status">{actionData.stopped ? "They are stopped. Under Team you can have them again." : "This link does not hold."}</p>
      ) : loaderData.about === null ? (
        <p>This link does not hold.</p>
      ) : (
        <Form method="post" className="grid justify-items-start gap-3">
          <p>You get a mail when {loaderData.about}.</p>
          <Button type="submit" tone="main">
            Stop them
          </Button>
        </Form>
      )}
    </main>
  );
}
