import { requireDevice } from "~/auth/require-row.server";
import { loadDeviceDescription } from "~/services/device-library.server";
import type { Route } from "./+types/device-description";

/** `GET /devices/:deviceId/description`: what was read of the device description, as JSON. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { device } = await requireDevice(request, params.deviceId, "read");
  return Response.json(await loadDeviceDescription(device), { headers: { "cache-control": "private, max-age=3600" } });
}
