import type { Route } from "./+types/models.$modelId.survey";
import { requireModelForPage } from "~/auth/require-model.server";
import { useOpenModel } from "~/components/model/use-model";
import { SurveyView } from "~/components/survey/survey-view";
import { Progress } from "~/components/ui/progress";
import { listDevices } from "~/services/read-devices.server";

export async function loader({ request, params }: Route.LoaderArgs) {
  const { model } = await requireModelForPage(request, params.modelId, "read");
  return { name: model.name, devices: await listDevices(model.organizationId) };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Signal survey of ${loaderData?.name ?? "the model"} · Ferrule` },
];

export default function SurveyRoute({ loaderData }: Route.ComponentProps) {
  const { isReady } = useOpenModel();
  if (!isReady)
    return (
      <main id="main" className="grid flex-1 place-content-center p-8">
        <h1 className="sr-only">Signal survey</h1>
        <Progress stage="Loading the required models" className="w-96" />
      </main>
    );
  return <SurveyView devices={loaderData.devices} />;
}
