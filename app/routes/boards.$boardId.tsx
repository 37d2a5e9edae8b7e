import type { Route } from "./+types/boards.$boardId";
import { mayDo, requireUser } from "~/auth/caller.server";
import { BoardView } from "~/components/boards/board-view";
import { boardChangeSchema, changeBoard, readBoardPage, requireBoard } from "~/services/watch-boards.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";

export const meta: Route.MetaFunction = ({ loaderData }) => [{ title: `${loaderData?.board.name ?? "Board"} · Ferrule` }];

export async function loader({ request, params }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const row = await requireBoard(caller, params.boardId, "read");
  const query = new URL(request.url).searchParams;
  const board = await readBoardPage(row, { machine: query.get("machine"), target: query.get("server") });
  return { board, isWall: query.has("wall"), mayArrange: mayDo(caller, "test-server.run", row.organizationId) };
}

/** `PUT` with JSON: the arrangement. */
export async function action({ request, params }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const row = await requireBoard(caller, params.boardId, "test-server.run");
  requireMethod(request, "PUT");
  const changed = await changeBoard(caller, row, await requireJson(request, boardChangeSchema, 1_000_000));
  return changed.ok ? Response.json(changed.value) : problemResponse(409, changed.problems);
}

export default function Board({ loaderData }: Route.ComponentProps) {
  return <BoardView key={`${loaderData.board.id} ${loaderData.board.version}`} {...loaderData} />;
}
