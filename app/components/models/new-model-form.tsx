import { getFormProps, useForm, type SubmissionResult } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { useMemo, useState } from "react";
import { Form, useNavigation } from "react-router";
import { RequiredModelsField } from "~/components/library/required-models-field";
import type { LibraryChoice } from "~/services/list-library-choices.server";
import { ConformField } from "~/components/shell/conform-field";
import { Button, LinkButton } from "~/components/ui/button";
import { Field, Input } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { retrofitRequiredModels } from "~/domain/editing/starters/retrofit-models";
import { newModelSchema as schema, type ModelStarter } from "~/utils/model-forms";
import { ChoiceCard } from "./choice-card";
import { KindSketch } from "./kind-sketch";
import { findNamespaceBase, proposeNamespaceUri } from "./propose-namespace";
import { StarterChoice } from "./starter-choice";

type Kind = "types" | "machines";

type Props = {
  lastResult: SubmissionResult<string[]> | null;
  organizationName: string;
  /** Names and namespaces that the team's models have already. */
  taken: readonly { readonly name: string; readonly namespaceUri: string }[];
  choices: readonly LibraryChoice[];
};

export function NewModelForm({ lastResult, organizationName, taken, choices }: Props) {
  const busy = useNavigation().state !== "idle";
  const [kind, setKind] = useState<Kind>("types");
  const [uri, setUri] = useState<string | undefined>(undefined);
  const [name, setName] = useState("");
  const [required, setRequired] = useState<readonly string[]>([]);
  const [start, setStart] = useState<ModelStarter>("blank");
  const needed =
    kind === "types" && start === "retrofit" ? [...new Set([...required, ...retrofitRequiredModels])] : required;
  const [form, fields] = useForm({
    lastResult,
    defaultValue: { version: "1.0.0" },
    constraint: getZodConstraint(schema),
    onValidate: ({ formData }) => parseWithZod(formData, { schema }),
    shouldValidate: "onBlur",
    shouldRevalidate: "onInput",
  });
  const namespaceBase = useMemo(
    () =>
      findNamespaceBase(
        taken.map((model) => model.namespaceUri),
        organizationName,
      ),
    [taken, organizationName],
  );
  const proposed = uri ?? proposeNamespaceUri(namespaceBase, name);
  const twin = taken.find((model) => model.namespaceUri === proposed);
  const uriErrors = twin ? [`The model “${twin.name}” has this namespace already`] : fields.namespaceUri.errors;
  return (
    <Form method="post" {...getFormProps(form)} className="grid max-w-200 gap-5">
      {form.errors ? <Notice tone="error" title={form.errors.join(" ")} live /> : null}
      <fieldset>
        <legend className="mb-1 text-note font-medium text-ink-2">Kind</legend>
        <div className="grid grid-cols-2 gap-3 max-sm:grid-cols-1">
          <ChoiceCard
            name="kind"
            value="types"
            chosen={kind}
            onChoose={setKind}
            sketch={<KindSketch kind="types" />}
            title="Types"
            about="What a kind of machine exposes: object types, variables with unit and range, enumerations, methods."
          />
          <ChoiceCard
            name="kind"
            value="machines"
            chosen={kind}
            onChoose={setKind}
            sketch={<KindSketch kind="machines" />}
            title="Machines"
            about="The machines themselves: instances of types of another model, with their identification."
          />
        </div>
      </fieldset>
      <div className="grid grid-cols-[1fr_140px] gap-3">
        <Field label="Name" errors={fields.name.errors}>
          {(tied) => (
            <Input
              {...tied}
              name={fields.name.name}
              value={name}
              onChange={(event) => setName(event.currentTarget.value)}
              placeholder={kind === "types" ? "Rope braider" : "Hall 2"}
              size="large"
              maxLength={100}
              autoFocus
            />
          )}
        </Field>
        <ConformField field={fields.version} label="Version" size="large" mono />
      </div>
      <Field
        label="Namespace URI"
        errors={uriErrors}
        hint="Every NodeId of the model carries it. Take a URI below a domain that your works own; it stays for good, also when the model is renamed."
      >
        {(tied) => (
          <Input
            {...tied}
            name={fields.namespaceUri.name}
            value={proposed}
            onChange={(event) => setUri(event.currentTarget.value)}
            size="large"
            mono
            spellCheck={false}
          />
        )}
      </Field>
      {kind === "types" ? <StarterChoice start={start} onChoose={setStart} /> : null}
      <div className="grid gap-1">
        <h2 className="text-note font-medium text-ink-2">Required models</h2>
        {kind === "machines" ? (
          <p className="text-note text-ink-3">
            Of your own models the newest frozen revision is taken and held; a later one comes when you take it on the page Roll-out.
          </p>
        ) : null}
        <RequiredModelsField choices={choices} chosen={needed} onChange={setRequired} name={fields.required.name} />
      </div>
      <p className="flex gap-2">
        <Button
          type="submit"
          tone="main"
          size="large"
          busy={busy}
          blockedBy={twin ? "the namespace is taken" : undefined}
        >
          Create model
        </Button>
        <LinkButton to="/models" size="large" tone="bare">
          Cancel
        </LinkButton>
      </p>
    </Form>
  );
}
