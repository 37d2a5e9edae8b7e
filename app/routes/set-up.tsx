import { getFormProps, useForm } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { data, Form, redirect, useNavigation } from "react-router";
import type { Route } from "./+types/set-up";
import { ConformField } from "~/components/shell/conform-field";
import { Gate } from "~/components/shell/gate";
import { Button } from "~/components/ui/button";
import { Notice } from "~/components/ui/notice";
import { formatProblem } from "~/domain/core/problem-texts";
import { needsSetUp, setUpOrganization } from "~/services/set-up-organization.server";
import { signIn } from "~/services/sign-in.server";
import { setUpFormSchema as schema } from "~/utils/set-up-form";

export const meta: Route.MetaFunction = () => [{ title: "Set up · Ferrule" }];

export async function loader() {
  if (!(await needsSetUp())) throw redirect("/sign-in");
  return null;
}

export async function action({ request }: Route.ActionArgs) {
  const submission = parseWithZod(await request.formData(), { schema });
  if (submission.status !== "success")
    return data(submission.reply({ hideFields: ["password", "repeat"] }), { status: 400 });
  const { code, organizationName, name, email, password } = submission.value;
  const intent = { code, organizationName, name, email, password };
  const result = await setUpOrganization(request, intent);
  if (!result.ok) {
    const reply = submission.reply({
      formErrors: result.problems.map(formatProblem),
      hideFields: ["password", "repeat"],
    });
    return data(reply, { status: 422 });
  }
  const signedIn = await signIn(request, intent);
  return signedIn.ok ? redirect("/", { headers: signedIn.value.headers }) : redirect("/sign-in");
}

export default function SetUp({ actionData }: Route.ComponentProps) {
  const busy = useNavigation().state === "submitting";
  const [form, fields] = useForm({
    lastResult: actionData ?? null,
    constraint: getZodConstraint(schema),
    onValidate: ({ formData }) => parseWithZod(formData, { schema }),
    shouldRevalidate: "onInput",
  });
  return (
    <Gate
      title="Set up Ferrule"
      about="Nobody is here yet. Create your organisation and its first administrator; you add the others on the Team page."
    >
      <Form method="post" {...getFormProps(form)} className="grid gap-3">
        {form.errors ? <Notice tone="error" title={form.errors.join(" ")} live /> : null}
        <ConformField
          field={fields.code}
          label="Set-up code"
          hint="The console that started Ferrule printed it: it proves that this server is yours."
          size="large"
          mono
          autoFocus
          autoComplete="one-time-code"
        />
        <ConformField
          field={fields.organizationName}
          label="Organisation"
          hint="As your works call themselves."
          size="large"
          autoComplete="organization"
        />
        <ConformField field={fields.name} label="Your name" size="large" autoComplete="name" />
        <ConformField field={fields.email} label="E-mail" type="email" size="large" autoComplete="username" />
        <div className="grid grid-cols-2 gap-3 max-sm:grid-cols-1">
          <ConformField
            field={fields.password}
            label="Password"
            type="password"
            hint="At least 10 characters."
            size="large"
            autoComplete="new-password"
          />
          <ConformField
            field={fields.repeat}
            label="Password again"
            type="password"
            size="large"
            autoComplete="new-password"
          />
        </div>
        <Button type="submit" tone="main" size="large" busy={busy} className="mt-1">
          Create organisation
        </Button>
      </Form>
    </Gate>
  );
}
