import { requireDevice } from "~/auth/require-row.server";
import { readDevicePicture } from "~/services/device-library.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/device-picture";

/** `GET /devices/:deviceId/picture?name=`: a PNG or JPEG of the package. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { device } = await requireDevice(request, params.deviceId, "read");
  const picture = await readDevicePicture(device, new URL(request.url).searchParams.get("name") ?? "");
  if (!picture) throw failWith(404, "request.not-found");
  return new Response(picture.bytes as Uint8Array<ArrayBuffer>, {
    headers: {
      "content-type": picture.type,
      "cache-control": "private, max-age=86400, immutable",
      "content-security-policy": "default-src 'none'; sandbox",
      "x-content-type-options": "nosniff",
    },
  });
}
