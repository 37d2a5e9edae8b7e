import { assertMay, requireCaller } from "~/auth/caller.server";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { exportAudit } from "~/presenters/audit.server";
import type { Route } from "./+types/audit";

/** `GET /team/audit.csv`: the audit of the chosen organisation, for its administrators. */
export async function loader({ request }: Route.LoaderArgs): Promise<Response> {
  const caller = await requireCaller(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "organization.administer", organizationId);
  const lines = exportAudit(organizationId);
  const encoder = new TextEncoder();
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const { done, value } = await lines.next();
      if (done) controller.close();
      else controller.enqueue(encoder.encode(value));
    },
  });
  return new Response(body, {
    headers: {
      "content-type": "text/csv; charset=utf-8",
      "content-disposition": 'attachment; filename="ferrule-audit.csv"',
      "cache-control": "no-store",
    },
  });
}
