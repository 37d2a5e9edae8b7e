import { ScanSearch } from "lucide-react";
import { Form, useNavigation } from "react-router";
import type { ServedNamespace } from "~/services/learn-model.server";
import type { ImportPreview } from "~/services/preview-import.server";
import { ImportPreviewView } from "../models/import-preview";
import { ProblemList, type ShownProblem } from "../models/problem-list";
import { Button, LinkButton } from "../ui/button";
import { Notice } from "../ui/notice";
import { Page } from "../ui/page";
import { Progress } from "../ui/progress";

type Props = {
  id: string;
  name: string;
  endpointUrl: string | null;
  namespaces: readonly ServedNamespace[];
  problems: readonly ShownProblem[];
  preview: ImportPreview | null;
  refusals: readonly ShownProblem[];
};

/** From a running server to a model: choose the namespace, read it, look at what would come of it. */
export function LearnView({ id, name, endpointUrl, namespaces, problems, preview, refusals }: Props) {
  const isReading = useNavigation().state === "submitting";
  if (preview) {
    return (
      <Page title={`Learn from ${name}`} about="What the server has, as a NodeSet2 text. Nothing is stored yet.">
        <ImportPreviewView preview={preview} target="model" action="/models/import" />
      </Page>
    );
  }
  return (
    <Page
      title={`Learn from ${name}`}
      about={<span className="font-mono">{endpointUrl}</span>}
      actions={<LinkButton to={`/live/${id}`}>Watch values</LinkButton>}
    >
      <div className="grid max-w-200 gap-4">
        <p className="text-small text-ink-2">
          Types and instances of one namespace become a model that you can document, compare and map. Ferrule only reads; no values are written. Values of the moment are left out, those of Properties are kept.
        </p>
        {problems.length > 0 ? <Notice tone="error" title="The server cannot be read" live>{problems.map((problem) => problem.message).join(" ")}</Notice> : null}
        {refusals.length > 0 ? (
          <section>
            <Notice tone="error" title="Nothing was learnt" live className="mb-3">
              Nothing was stored.
            </Notice>
            <ProblemList problems={refusals} caption="Problems" />
          </section>
        ) : null}
        {namespaces.length > 0 ? <NamespaceForm namespaces={namespaces} isReading={isReading} /> : null}
      </div>
    </Page>
  );
}

const KNOWN = { published: "in the library already", model: "a model of the team already" } as const;

function NamespaceForm({ namespaces, isReading }: Pick<Props, "namespaces"> & { isReading: boolean }) {
  const first = namespaces.find((one) => one.knownAs === null)?.uri;
  return (
    <Form method="post" className="grid gap-3">
      <fieldset className="border-t border-ink">
        <legend className="pb-1 text-note text-ink-3">Namespaces of the server</legend>
        {namespaces.map(({ uri, version, knownAs }) => (
          <label key={uri} className="flex min-h-8 items-center gap-2 border-b border-hair text-small">
            <input type="radio" name="namespaceUri" value={uri} defaultChecked={uri === first} required disabled={knownAs !== null} />
            <span className={knownAs === null ? "font-mono break-all" : "font-mono break-all text-ink-3"}>{uri}</span>
            <span className="ml-auto shrink-0 text-ink-3">{[version, knownAs === null ? null : KNOWN[knownAs]].filter(Boolean).join(", ")}</span>
          </label>
        ))}
      </fieldset>
      {isReading ? (
        <Progress stage="Reading the address space" />
      ) : (
        <Button type="submit" tone="main" icon={ScanSearch} className="justify-self-start" blockedBy={first === undefined ? "Every namespace of the server is known already" : undefined}>
          Read it and show what it is
        </Button>
      )}
    </Form>
  );
}
