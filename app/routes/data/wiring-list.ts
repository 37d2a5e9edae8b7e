import { assertMay, requireCaller } from "~/auth/caller.server";
import { writeWiringCsv } from "~/domain/deliver/wiring-list";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { makeWiringList } from "~/services/make-wiring-list.server";
import { toAttachment } from "~/utils/attachment.server";
import type { Route } from "./+types/wiring-list";

/** `GET /sources/wiring-list.csv` */
export async function loader({ request }: Route.LoaderArgs): Promise<Response> {
  const caller = await requireCaller(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return toAttachment(writeWiringCsv(await makeWiringList(organizationId)), "wiring-list.csv", "text/csv; charset=utf-8");
}
