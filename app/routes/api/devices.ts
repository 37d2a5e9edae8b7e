import { assertMay, requireCaller, requireOrganization } from "~/auth/caller.server";
import { PACKAGE_LIMITS } from "~/domain/iodd/read-package";
import { addDeviceFile } from "~/services/device-library.server";
import { listDevices } from "~/services/read-devices.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireFields, requireMethod } from "~/utils/parse-request.server";
import { problemResponse, toProblemJson } from "~/utils/problem-response.server";
import { readFileBody } from "~/utils/read-file-body.server";
import { z } from "zod";
import type { Route } from "./+types/devices";

const querySchema = z.object({ name: z.string().trim().min(1).max(200).default("device.zip") });

/** `GET /api/v1/devices`: the device library. */
export const loader = handleApi(async ({ request }: Route.LoaderArgs) => {
  const caller = await requireCaller(request);
  const { organizationId } = requireOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return Response.json(await listDevices(organizationId), { headers: { "cache-control": "no-store" } });
});

/** `POST /api/v1/devices?name=` with an IODD as XML or ZIP. */
export const action = handleApi(async ({ request }: Route.ActionArgs) => {
  const caller = await requireCaller(request);
  requireMethod(request, "POST");
  const { organizationId } = requireOrganization(request, caller);
  assertMay(caller, "mapping.edit", organizationId);
  const { name } = requireFields(querySchema, { name: new URL(request.url).searchParams.get("name") ?? undefined });
  const file = await readFileBody(request, { name, limit: PACKAGE_LIMITS.bytes });
  if (!file.ok) return problemResponse(file.problems[0]?.code === "limit.file-size" ? 413 : 422, file.problems);
  const added = await addDeviceFile(caller, organizationId, { bytes: file.value.bytes, fileName: file.value.name });
  if (!added.ok) return problemResponse(422, added.problems);
  const ids = new Set(added.value.devices.map((d) => d.id));
  const devices = (await listDevices(organizationId)).filter((d) => ids.has(d.id));
  return Response.json({ devices, problems: added.value.problems.map(toProblemJson) }, { status: 201 });
});
