/** The people of the demo organisation. All invented; the accounts exist in the demo's own database only. */
export type DemoAccount = {
  readonly name: string;
  readonly email: string;
  readonly roles: readonly ("administrator" | "engineer" | "integrator" | "reviewer" | "developer")[];
  /** What this person does here, for the sign-in page. */
  readonly job: string;
};

export const demoOrganizationName = "Merrow Ropeworks";
export const demoPassword = "six-braiders-one-model";

export const demoAccounts: readonly DemoAccount[] = [
  { name: "Ines Okafor", email: "ines@merrow.example", roles: ["administrator"], job: "people, roles, everything" },
  { name: "Tomas Lindqvist", email: "tomas@merrow.example", roles: ["engineer"], job: "models the machine type" },
  { name: "Priya Raman", email: "priya@merrow.example", roles: ["integrator"], job: "wires signals to the nodes" },
  { name: "Joao Brandt", email: "joao@merrow.example", roles: ["reviewer"], job: "signs or refuses a change" },
  { name: "Mei Castellan", email: "mei@merrow.example", roles: ["developer"], job: "reads values, builds boards" },
];
