import { requireDevice } from "~/auth/require-row.server";
import { loadDeviceDescription } from "~/services/device-library.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import type { Route } from "./+types/device";

/** `GET /api/v1/devices/{id}`: what was read of the device description. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { device } = await requireDevice(request, params.deviceId, "read");
  return Response.json(await loadDeviceDescription(device), { headers: { "cache-control": "private, max-age=3600" } });
});

export const action = refuseChanges;
