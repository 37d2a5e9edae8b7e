import { data, redirect } from "react-router";
import { z } from "zod";
import type { Route } from "./+types/boards";
import { requireModelForPage } from "~/auth/require-model.server";
import { assertMay, mayDo, requireUser } from "~/auth/caller.server";
import { BoardsView } from "~/components/boards/boards-view";
import { formatProblem } from "~/domain/core/problem-texts";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { openBoardOf, readBoardsPage, removeBoard, requireBoard } from "~/services/watch-boards.server";

export const meta: Route.MetaFunction = () => [{ title: "Watch boards · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return { ...(await readBoardsPage(organizationId)), mayMake: mayDo(caller, "test-server.run", organizationId) };
}

const schema = z.discriminatedUnion("intent", [
  z.strictObject({ intent: z.literal("open"), modelId: z.string().max(100), machine: z.string().max(4_000) }),
  z.strictObject({ intent: z.literal("remove"), id: z.string().max(100) }),
]);

export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const parsed = schema.safeParse(Object.fromEntries(await request.formData()));
  if (!parsed.success) return data({ errors: ["The request cannot be understood."] }, { status: 400 });
  if (parsed.data.intent === "remove") {
    await removeBoard(caller, await requireBoard(caller, parsed.data.id, "test-server.run"));
    return redirect("/boards");
  }
  const { modelId, machine } = parsed.data;
  await requireModelForPage(request, modelId, "test-server.run");
  const opened = await openBoardOf(caller, modelId, machine);
  if (!opened.ok) return data({ errors: opened.problems.map(formatProblem) }, { status: 422 });
  return redirect(`/boards/${opened.value.id}?machine=${encodeURIComponent(machine)}`);
}

export default function Boards({ loaderData, actionData }: Route.ComponentProps) {
  return <BoardsView {...loaderData} errors={actionData?.errors ?? []} />;
}
