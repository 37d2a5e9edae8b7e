/** What the sign-in page shows: in the demo the invented people, each with one press. */
import { demoAccounts, demoPassword, type DemoAccount } from "../utils/demo-accounts";
import { getEnvironment } from "../utils/env.server";

export type SignInPageData = {
  readonly demo: { readonly accounts: readonly DemoAccount[]; readonly password: string } | null;
};

export function readSignInPage(): SignInPageData {
  return { demo: getEnvironment().isDemo ? { accounts: demoAccounts, password: demoPassword } : null };
}
