import { data } from "react-router";
import type { Route } from "./+types/readers";
import { assertMay, mayDo, requireUser } from "~/auth/caller.server";
import { ReadersView } from "~/components/reviews/readers-view";
import { formatProblem } from "~/domain/core/problem-texts";
import { fail, problem, type Result } from "~/domain/core/result";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { presentReaders } from "~/presenters/readers.server";
import { readerSchema, removeReader, saveReader } from "~/services/manage-readers.server";

export const meta: Route.MetaFunction = () => [{ title: "Readers · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return { readers: await presentReaders(organizationId), mayEdit: mayDo(caller, "comment", organizationId) };
}

export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "comment", organizationId);
  const form = await request.formData();
  const result = await act();
  return data({ errors: result.ok ? [] : result.problems.map(formatProblem) }, { status: result.ok ? 200 : 409 });

  async function act(): Promise<Result<unknown>> {
    if (form.get("intent") === "remove") return removeReader(caller, organizationId, String(form.get("id") ?? ""));
    const id = form.get("id");
    const parsed = readerSchema.safeParse({
      ...(typeof id === "string" && id !== "" ? { id } : {}),
      name: form.get("name"),
      about: form.get("about") ?? "",
      contact: form.get("contact") ?? "",
      nodeIds: String(form.get("nodeIds") ?? "")
        .split(/\r?\n/)
        .map((line) => line.trim())
        .filter((line) => line !== ""),
    });
    return parsed.success
      ? saveReader(caller, organizationId, parsed.data)
      : fail(problem("request.field", { field: "name", message: "write a name" }));
  }
}

export default function Readers({ loaderData, actionData }: Route.ComponentProps) {
  return <ReadersView {...loaderData} errors={actionData?.errors ?? []} />;
}
