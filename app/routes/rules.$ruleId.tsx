import { data } from "react-router";
import type { Route } from "./+types/rules.$ruleId";
import { requireUser } from "~/auth/caller.server";
import { RuleHelpView } from "~/components/rules/rule-help-view";
import { readRuleHelp } from "~/presenters/rules.server";

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `${loaderData ? `${loaderData.help.id} ${loaderData.help.title}` : "Rule"} · Ferrule` },
];

export async function loader({ request, params }: Route.LoaderArgs) {
  await requireUser(request);
  const help = await readRuleHelp(params.ruleId.toUpperCase());
  if (!help) throw data(null, { status: 404 });
  return { help };
}

export default function RuleHelp({ loaderData }: Route.ComponentProps) {
  return <RuleHelpView help={loaderData.help} />;
}
