import type { Route } from "./+types/as-built.$reportId";
import { requireUser } from "~/auth/caller.server";
import { ReportView } from "~/components/as-built/report-view";
import { requireAsBuiltReport } from "~/services/read-as-built.server";

export const meta: Route.MetaFunction = ({ loaderData }) => [{ title: `As-built report ${loaderData?.summary.number ?? ""} · Ferrule` }];

export async function loader({ request, params }: Route.LoaderArgs) {
  const { summary, body, modelId } = await requireAsBuiltReport(await requireUser(request), params.reportId);
  return { summary, body, modelId };
}

export default function AsBuiltReport({ loaderData }: Route.ComponentProps) {
  return <ReportView {...loaderData} />;
}
