import { assertMay, requireCaller, requireOrganization } from "~/auth/caller.server";
import { findPublicKey } from "~/services/signing-keys.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/signing-key";

/** `GET /api/v1/signing-key`: the organisation's public key in PEM, for `verify --key`. */
export const loader = handleApi(async ({ request }: Route.LoaderArgs) => {
  const caller = await requireCaller(request);
  const { organizationId } = requireOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  const pem = await findPublicKey(organizationId);
  if (pem === undefined) throw failWith(404, "request.not-found");
  return new Response(pem, {
    headers: {
      "content-type": "application/x-pem-file",
      "content-disposition": 'attachment; filename="ferrule-key.pem"',
      "cache-control": "no-store",
    },
  });
});

export const action = refuseChanges;
