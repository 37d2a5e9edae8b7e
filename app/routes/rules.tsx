import type { Route } from "./+types/rules";
import { requireUser } from "~/auth/caller.server";
import { RulesView } from "~/components/rules/rules-view";
import { listRules } from "~/domain/checks/rule-list";

export const meta: Route.MetaFunction = () => [{ title: "Rules · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  await requireUser(request);
  return { rules: listRules() };
}

export default function Rules({ loaderData }: Route.ComponentProps) {
  return <RulesView rules={loaderData.rules} />;
}
