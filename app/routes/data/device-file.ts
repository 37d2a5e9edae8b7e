import { requireDevice } from "~/auth/require-row.server";
import { readDeviceFile } from "~/services/device-library.server";
import { toAttachment } from "~/utils/attachment.server";
import type { Route } from "./+types/device-file";

/** `GET /devices/:deviceId/file`: the file as it was uploaded, byte for byte. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { device } = await requireDevice(request, params.deviceId, "read");
  const { bytes, fileName } = await readDeviceFile(device);
  return toAttachment(bytes, fileName, fileName.toLowerCase().endsWith(".xml") ? "application/xml" : "application/zip");
}
