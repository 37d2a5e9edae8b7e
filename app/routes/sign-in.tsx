import { getFormProps, useForm } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { data, Form, redirect, useNavigation, useSearchParams } from "react-router";
import { z } from "zod";
import type { Route } from "./+types/sign-in";
import { findCaller } from "~/auth/caller.server";
import { DemoPeople } from "~/components/shell/demo-people";
import { ConformField } from "~/components/shell/conform-field";
import { Gate } from "~/components/shell/gate";
import { Button } from "~/components/ui/button";
import { Notice } from "~/components/ui/notice";
import { formatProblem } from "~/domain/core/problem-texts";
import { readSignInPage } from "~/presenters/sign-in-page.server";
import { needsSetUp } from "~/services/set-up-organization.server";
import { signIn } from "~/services/sign-in.server";
import { toSafePath } from "~/utils/safe-return";

const schema = z.object({
  email: z.string("Write your e-mail address").max(320, "That is too long"),
  password: z.string("Write your password").max(200, "That is too long"),
});

export const meta: Route.MetaFunction = () => [{ title: "Sign in · Ferrule" }];

export async function loader({ request }: Route.LoaderArgs) {
  if (await needsSetUp()) throw redirect("/set-up");
  if (await findCaller(request)) throw redirect(toSafePath(new URL(request.url).searchParams.get("to")));
  return readSignInPage();
}

export async function action({ request }: Route.ActionArgs) {
  const form = await request.formData();
  const submission = parseWithZod(form, { schema });
  if (submission.status !== "success") return data(submission.reply({ hideFields: ["password"] }), { status: 400 });
  const result = await signIn(request, submission.value);
  if (result.ok) return redirect(toSafePath(form.get("to")), { headers: result.value.headers });
  const status = result.problems.some((p) => p.code === "auth.too-many-attempts") ? 429 : 401;
  return data(submission.reply({ formErrors: result.problems.map(formatProblem), hideFields: ["password"] }), {
    status,
  });
}

export default function SignIn({ loaderData, actionData }: Route.ComponentProps) {
  const [search] = useSearchParams();
  const busy = useNavigation().state === "submitting";
  const to = toSafePath(search.get("to"));
  const [form, fields] = useForm({
    lastResult: actionData ?? null,
    constraint: getZodConstraint(schema),
    onValidate: ({ formData }) => parseWithZod(formData, { schema }),
  });
  const { demo } = loaderData;
  return (
    <Gate
      title="Sign in"
      about={
        demo
          ? "Choose whom to be in the demo, one press each."
          : "With the account that your administrator made for you."
      }
    >
      {demo ? <DemoPeople accounts={demo.accounts} password={demo.password} to={to} /> : null}
      {demo ? (
        <p className="flex items-center gap-3 text-note text-ink-3 before:h-px before:flex-1 before:bg-rule after:h-px after:flex-1 after:bg-rule">
          or by hand
        </p>
      ) : null}
      <Form method="post" {...getFormProps(form)} className="grid gap-3">
        {form.errors ? <Notice tone="error" title={form.errors.join(" ")} live /> : null}
        <input type="hidden" name="to" value={to} />
        <ConformField
          field={fields.email}
          label="E-mail"
          type="email"
          autoComplete="username"
          size="large"
          autoFocus={!demo}
        />
        <ConformField
          field={fields.password}
          label="Password"
          type="password"
          autoComplete="current-password"
          size="large"
        />
        <Button type="submit" tone={demo ? "plain" : "main"} size="large" busy={busy} className="mt-1">
          Sign in
        </Button>
      </Form>
    </Gate>
  );
}
