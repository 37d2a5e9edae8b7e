import { FileUp, Plus } from "lucide-react";
import type { Route } from "./+types/models";
import { assertMay, mayDo, requireUser } from "~/auth/caller.server";
import { ModelsTable } from "~/components/models/models-table";
import { useRevalidateOn } from "~/components/shell/use-revalidate-on";
import { Button, LinkButton } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Page } from "~/components/ui/page";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { listModelSummaries } from "~/services/read-park.server";

export const meta: Route.MetaFunction = () => [{ title: "Models · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return {
    organizationId,
    models: await listModelSummaries(organizationId),
    mayEdit: mayDo(caller, "model.edit", organizationId),
  };
}

export default function Models({ loaderData }: Route.ComponentProps) {
  const { models, mayEdit, organizationId } = loaderData;
  useRevalidateOn(`models:${organizationId}`);
  return (
    <Page
      title="Models"
      about="Each is one namespace that the team writes."
      actions={
        mayEdit ? (
          <Actions isFirst={models.length === 0} />
        ) : (
          <Button blockedBy="asks for the role engineer or administrator">New model</Button>
        )
      }
    >
      {models.length === 0 ? (
        <Empty title="No models yet" className="min-h-60">
          Make one of kind types for what a kind of machine exposes, or import a NodeSet2 file that you have.
        </Empty>
      ) : (
        <ModelsTable models={models} />
      )}
    </Page>
  );
}

function Actions({ isFirst }: { isFirst: boolean }) {
  return (
    <>
      <LinkButton to="/models/import" icon={FileUp}>
        Import
      </LinkButton>
      <LinkButton to="/models/new" icon={Plus} tone={isFirst ? "main" : "plain"}>
        New model
      </LinkButton>
    </>
  );
}
