import type { ShouldRevalidateFunctionArgs } from "react-router";
import type { Route } from "./+types/models.$modelId.mapping";
import { requireModelForPage } from "~/auth/require-model.server";
import { BindingsView } from "~/components/mapping/bindings-view";
import { MappingView } from "~/components/mapping/mapping-view";
import { useOpenModel } from "~/components/model/use-model";
import { Progress } from "~/components/ui/progress";
import { loadPlannedSources } from "~/services/load-planned-sources.server";
import { listDevices } from "~/services/read-devices.server";
import { readSources } from "~/services/read-sources.server";
import { listReplacements } from "~/services/replace-device.server";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  const { organizationId } = model;
  const isTypes = model.kind === "types";
  const [devices, sources, planned, replacements] = await Promise.all([
    listDevices(organizationId),
    isTypes ? readSources(organizationId).then((read) => read.sources) : [],
    isTypes ? [] : loadPlannedSources(organizationId),
    isTypes ? [] : listReplacements(organizationId),
  ]);
  return {
    name: model.name,
    isTypes,
    devices,
    sources,
    planned,
    replacements: replacements.filter((one) => one.modelId === model.id),
  };
}

/** What is open stands in the address; that alone asks for nothing new. */
export function shouldRevalidate({ currentUrl, nextUrl, defaultShouldRevalidate }: ShouldRevalidateFunctionArgs) {
  const isSamePage = currentUrl.pathname === nextUrl.pathname;
  return defaultShouldRevalidate && !(isSamePage && currentUrl.search !== nextUrl.search);
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Mapping of ${loaderData?.name ?? "the model"} · Ferrule` },
];

export default function MappingRoute({ loaderData }: Route.ComponentProps) {
  const { isReady } = useOpenModel();
  const { isTypes, devices, sources, planned, replacements } = loaderData;
  if (!isReady)
    return (
      <main id="main" className="grid flex-1 place-content-center p-8">
        <h1 className="sr-only">Mapping</h1>
        <Progress stage="Loading the required models" className="w-96" />
      </main>
    );
  return isTypes ? (
    <MappingView devices={devices} sources={sources} />
  ) : (
    <BindingsView devices={devices} sources={planned} replacements={replacements} />
  );
}
