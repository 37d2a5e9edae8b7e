import { ArrowRight } from "lucide-react";
import { Form } from "react-router";
import { Icon } from "~/components/ui/icon";
import { Initials } from "~/components/ui/initials";
import type { DemoAccount } from "~/utils/demo-accounts";

/** The invented people of the demo, each a form of its own, so that one press signs in, with and without JavaScript. */
export function DemoPeople({
  accounts,
  password,
  to,
}: {
  accounts: readonly DemoAccount[];
  password: string;
  to: string;
}) {
  return (
    <section aria-label="Demo accounts">
      <ul className="border-y-[1.5px] border-ink">
        {accounts.map((account) => (
          <li key={account.email} className="border-b border-hair last:border-b-0">
            <Form method="post">
              <input type="hidden" name="email" value={account.email} />
              <input type="hidden" name="password" value={password} />
              <input type="hidden" name="to" value={to} />
              <button className="group grid w-full grid-cols-[24px_1fr_auto] items-center gap-3 px-2 py-2 text-left hover:bg-copper-wash focus-visible:-outline-offset-2">
                <Initials name={account.name} />
                <span className="min-w-0">
                  <span className="block">
                    <b className="font-semibold">{account.name}</b>{" "}
                    <span className="text-small text-ink-2">{account.roles.join(", ")}</span>
                  </span>
                  <span className="block text-note text-ink-3">{account.job}</span>
                </span>
                <Icon of={ArrowRight} className="text-ink-3 group-hover:text-copper" />
              </button>
            </Form>
          </li>
        ))}
      </ul>
      <p className="mt-2 text-note text-ink-3">
        Merrow Ropeworks, its people, machines, devices and numbers are all invented. These accounts exist in the demo’s
        own database only; all have the password <code className="font-mono text-ink-2">{password}</code>.
      </p>
    </section>
  );
}
