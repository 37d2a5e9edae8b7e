import { requireModel } from "~/auth/require-model.server";
import { listRenumberings } from "~/presenters/renumberings.server";
import { writeCsvLine } from "~/utils/write-csv";
import type { Route } from "./+types/renumberings";

/** `GET /models/:modelId/renumberings.csv`: every NodeId that was replaced, with what it became, the newest edit first. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { model } = await requireModel(request, params.modelId, "read");
  const lines = (await listRenumberings(model.id)).flatMap(({ at, author, changes }) =>
    changes.map(({ from, to }) => writeCsvLine([at, author, from, to])),
  );
  return new Response(writeCsvLine(["At", "By", "Before", "After"]) + lines.join(""), {
    headers: {
      "content-type": "text/csv; charset=utf-8",
      "content-disposition": 'attachment; filename="renumbered-nodes.csv"',
      "cache-control": "no-store",
    },
  });
}
