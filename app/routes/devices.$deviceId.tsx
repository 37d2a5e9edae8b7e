import { data, redirect } from "react-router";
import type { Route } from "./+types/devices.$deviceId";
import { mayDo, requireUser } from "~/auth/caller.server";
import { requireDevice } from "~/auth/require-row.server";
import { DeviceView } from "~/components/devices/device-view";
import { groupVersions } from "~/components/devices/group-versions";
import { getDevice, listDevices } from "~/services/read-devices.server";
import { removeDevice } from "~/services/device-library.server";
import { failWith } from "~/utils/problem-response.server";

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `${loaderData?.device.summary.productIds[0] ?? "Device"} · Ferrule` },
];

export async function loader({ request, params }: Route.LoaderArgs) {
  await requireUser(request);
  const { caller, device: row } = await requireDevice(request, params.deviceId, "read");
  const { organizationId, vendorId, deviceId } = row;
  const [device, devices] = await Promise.all([getDevice(organizationId, row.id), listDevices(organizationId)]);
  if (!device) throw failWith(404, "request.not-found");
  const group = groupVersions(devices).find((one) => one.key === `${vendorId}/${deviceId}`);
  return {
    device: { ...device, versions: group?.versions ?? [] },
    mayEdit: mayDo(caller, "mapping.edit", organizationId),
  };
}

export async function action({ request, params }: Route.ActionArgs) {
  const { caller, device } = await requireDevice(request, params.deviceId, "mapping.edit");
  const [use] = (await getDevice(device.organizationId, device.id))?.summary.usedBy ?? [];
  if (use) {
    return data(
      { refusal: `${use.type} reads it as ${use.role}: give that role another device first.` },
      { status: 409 },
    );
  }
  await removeDevice(caller, device);
  return redirect("/devices");
}

export default function Device({ loaderData, actionData }: Route.ComponentProps) {
  return (
    <DeviceView
      key={loaderData.device.summary.id}
      device={loaderData.device}
      editBlockedBy={loaderData.mayEdit ? undefined : "asks for the role integrator, engineer or administrator"}
      refusal={actionData?.refusal}
    />
  );
}
