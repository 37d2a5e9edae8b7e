import { getFormProps, useForm, type SubmissionResult } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { Form, useNavigation } from "react-router";
import { ConformField } from "~/components/shell/conform-field";
import { Button } from "~/components/ui/button";
import { Notice } from "~/components/ui/notice";
import { RoleBoxes } from "./role-boxes";
import { addPersonSchema as schema } from "./team-forms";

export function AddPersonForm({ lastResult, count }: { lastResult: SubmissionResult<string[]> | null; count: number }) {
  const busy = useNavigation().formData?.get("intent") === "add-person";
  const [form, fields] = useForm({
    id: `add-person-${count}`,
    lastResult,
    constraint: getZodConstraint(schema),
    onValidate: ({ formData }) => parseWithZod(formData, { schema }),
    shouldRevalidate: "onInput",
  });
  return (
    <Form method="post" {...getFormProps(form)} className="grid gap-3">
      {form.errors ? <Notice tone="error" title={form.errors.join(" ")} live /> : null}
      <input type="hidden" name="intent" value="add-person" />
      <ConformField field={fields.name} label="Name" autoComplete="off" />
      <ConformField field={fields.email} label="E-mail" type="email" autoComplete="off" />
      <ConformField
        field={fields.password}
        label="First password"
        type="password"
        autoComplete="new-password"
        hint="At least 10 characters; tell it on a safe way."
      />
      <div>
        <RoleBoxes held={[]} />
        {fields.roles.errors ? <p className="mt-1 text-note text-error">{fields.roles.errors.join(" ")}</p> : null}
      </div>
      <Button type="submit" tone="ink" busy={busy} className="justify-self-start">
        Add person
      </Button>
    </Form>
  );
}
