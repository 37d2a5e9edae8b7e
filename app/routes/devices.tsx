import type { Route } from "./+types/devices";
import { assertMay, mayDo, requireUser } from "~/auth/caller.server";
import { DevicesView } from "~/components/devices/devices-view";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { listDevices } from "~/services/read-devices.server";

export const meta: Route.MetaFunction = () => [{ title: "Devices · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return { devices: await listDevices(organizationId), mayEdit: mayDo(caller, "mapping.edit", organizationId) };
}

export default function Devices({ loaderData }: Route.ComponentProps) {
  return (
    <DevicesView
      devices={loaderData.devices}
      editBlockedBy={loaderData.mayEdit ? undefined : "asks for the role integrator, engineer or administrator"}
    />
  );
}
