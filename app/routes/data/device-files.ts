import { assertMay, requireCaller } from "~/auth/caller.server";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { addDeviceFile } from "~/services/device-library.server";
import { requireFields, requireMethod } from "~/utils/parse-request.server";
import { problemResponse, toProblemJson } from "~/utils/problem-response.server";
import { readFileBody } from "~/utils/read-file-body.server";
import { PACKAGE_LIMITS } from "~/domain/iodd/read-package";
import { z } from "zod";
import type { Route } from "./+types/device-files";

const querySchema = z.object({ name: z.string().trim().min(1).max(200).default("device.zip") });

/** `POST /devices/files?name=` with one file as the body, or as `file` of a form: 200 with what it gave, 422 with problems. */
export async function action({ request }: Route.ActionArgs): Promise<Response> {
  const caller = await requireCaller(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "mapping.edit", organizationId);
  requireMethod(request, "POST");
  const { name } = requireFields(querySchema, Object.fromEntries(new URL(request.url).searchParams));
  const file = await readFileBody(request, { name, limit: PACKAGE_LIMITS.bytes });
  if (!file.ok) return problemResponse(file.problems[0]?.code === "limit.file-size" ? 413 : 422, file.problems);
  const added = await addDeviceFile(caller, organizationId, { bytes: file.value.bytes, fileName: file.value.name });
  if (!added.ok) return problemResponse(422, added.problems);
  const devices = added.value.devices.map(({ id, vendorId, deviceId, deviceName, documentVersion, schemaVersion }) => ({
    id,
    vendorId,
    deviceId,
    deviceName,
    documentVersion,
    schemaVersion,
  }));
  return Response.json({ devices, problems: added.value.problems.map(toProblemJson) });
}
