import type { Route } from "./+types/models.$modelId.mapping";
import { requireModelForPage } from "~/auth/require-model.server";
import { MappingView } from "~/components/mapping/mapping-view";
import { useOpenModel } from "~/components/model/use-model";
import { Progress } from "~/components/ui/progress";
import { listDevices } from "~/services/read-devices.server";
import { readSources } from "~/services/read-sources.server";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  const [devices, { sources }] = await Promise.all([
    listDevices(model.organizationId),
    readSources(model.organizationId),
  ]);
  return { name: model.name, devices, sources };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Mapping of ${loaderData?.name ?? "the model"} · Ferrule` },
];

export default function MappingRoute({ loaderData }: Route.ComponentProps) {
  const { isReady } = useOpenModel();
  if (!isReady)
    return (
      <main id="main" className="grid flex-1 place-content-center p-8">
        <h1 className="sr-only">Mapping</h1>
        <Progress stage="Loading the required models" className="w-96" />
      </main>
    );
  return <MappingView devices={loaderData.devices} sources={loaderData.sources} />;
}
