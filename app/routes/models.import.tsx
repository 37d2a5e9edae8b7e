import { useRef } from "react";
import { data, Form, redirect, useNavigate, useNavigation, useSearchParams } from "react-router";
import type { Route } from "./+types/models.import";
import { assertMay, requireUser } from "~/auth/caller.server";
import { FileDrop } from "~/components/models/file-drop";
import { useImportProgress } from "~/components/models/use-import-progress";
import { ImportPreviewView, type ImportTarget } from "~/components/models/import-preview";
import { ProblemList } from "~/components/models/problem-list";
import { Button } from "~/components/ui/button";
import { Notice } from "~/components/ui/notice";
import { Page } from "~/components/ui/page";
import { Progress } from "~/components/ui/progress";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { addToLibrary, importModel } from "~/services/import-model.server";
import { dropPendingUpload, previewImport, takePendingUpload } from "~/services/preview-import.server";
import { importSchema } from "~/utils/model-forms";
import { toProblemJson } from "~/utils/problem-response.server";
import { readUploadedFile } from "~/utils/uploaded-file.server";

export const meta: Route.MetaFunction = () => [{ title: "Import · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  const caller = await requireUser(request);
  assertMay(caller, "model.edit", chooseOrganization(request, caller).organizationId);
  return null;
}

export async function action({ request }: Route.ActionArgs) {
  const caller = await requireUser(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "model.edit", organizationId);
  if (request.headers.get("content-type")?.startsWith("multipart/form-data")) {
    const file = await readUploadedFile(request, "file");
    if (!file.ok) return refuse(file.problems, 422);
    const { bytes, name, progress } = file.value;
    const options = { signal: request.signal, ...(progress === undefined ? {} : { progress }) };
    const result = await previewImport(caller, organizationId, bytes, name, options);
    return result.ok ? { preview: result.value, problems: [] } : refuse(result.problems, 422);
  }
  const form = importSchema.safeParse(Object.fromEntries(await request.formData()));
  if (!form.success) return data({ preview: null, problems: [] }, { status: 400 });
  const { upload: uploadId, into, ...intent } = form.data;
  const upload = await takePendingUpload(caller, organizationId, uploadId, { signal: request.signal });
  if (!upload.ok) return refuse(upload.problems, 422);
  if (into === "library") {
    const added = await addToLibrary(caller, organizationId, upload.value);
    if (!added.ok) return refuse(added.problems, 422);
    dropPendingUpload(uploadId);
    return redirect(`/library?model=${encodeURIComponent(added.value.modelUri)}`);
  }
  const imported = await importModel(caller, organizationId, upload.value, {
    ...(intent.name ? { name: intent.name } : {}),
    ...(intent.kind ? { kind: intent.kind } : {}),
  });
  if (!imported.ok) return refuse(imported.problems, 422);
  dropPendingUpload(uploadId);
  return redirect(`/models/${imported.value.id}/sheet`);
}

function refuse(
  problems: Parameters<typeof toProblemJson>[0][] | readonly Parameters<typeof toProblemJson>[0][],
  status: number,
) {
  return data({ preview: null, problems: problems.map(toProblemJson) }, { status });
}

export default function Import({ actionData }: Route.ComponentProps) {
  const [search] = useSearchParams();
  const target: ImportTarget = search.get("into") === "library" ? "library" : "model";
  if (actionData?.preview)
    return (
      <Page title="Import" about="What the file is, and what would come of it.">
        <ImportPreviewView preview={actionData.preview} target={target} />
      </Page>
    );
  return (
    <Page
      title="Import"
      about={
        target === "library"
          ? "A NodeSet2 file for the library."
          : "A NodeSet2 file as a model of the team, or for the library."
      }
    >
      <Upload />
      {actionData && actionData.problems.length > 0 ? (
        <section className="mt-6 max-w-240">
          <Notice tone="error" title="This file cannot be taken in" live className="mb-3">
            Nothing was stored.
          </Notice>
          <ProblemList problems={actionData.problems} caption="Problems of the file" />
        </section>
      ) : null}
    </Page>
  );
}

function Upload() {
  const form = useRef<HTMLFormElement>(null);
  const name = useRef<HTMLInputElement>(null);
  const [done, follow] = useImportProgress();
  const navigation = useNavigation();
  const navigate = useNavigate();
  const busy = navigation.state !== "idle" && navigation.formMethod === "POST";
  async function send() {
    const progress = await follow();
    if (name.current) name.current.value = progress;
    form.current?.requestSubmit();
  }
  return (
    <Form ref={form} method="post" encType="multipart/form-data" className="grid max-w-200 gap-3">
      <FileDrop
        name="file"
        accept=".xml,application/xml,text/xml"
        label="Drop a NodeSet2 file here, or press to choose one"
        hint="XML, up to 50 MB. A preview comes first."
        onChosen={() => void send()}
      />
      <input ref={name} type="hidden" name="progress" />
      {busy ? (
        <Progress
          stage={done === undefined ? "Sending the file" : "Reading the file"}
          done={done}
          onCancel={() => void navigate(".", { replace: true })}
        />
      ) : (
        <noscript>
          <Button type="submit">Show the preview</Button>
        </noscript>
      )}
    </Form>
  );
}
