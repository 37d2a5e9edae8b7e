import { roles, type Role } from "~/auth/permissions";

const roleJobs: Readonly<Record<Role, string>> = {
  administrator: "everything, and people, roles, tokens of others, audit",
  engineer: "edits models; waives, freezes, releases, delivers",
  integrator: "edits devices, sources, mappings and machines; rolls out",
  reviewer: "approves or refuses; releases, delivers",
  developer: "reads everything; test servers, watch boards, API",
};

/** Several roles a person; each says what it allows. */
export function RoleBoxes({ held, name = "roles" }: { held: readonly Role[]; name?: string }) {
  return (
    <fieldset className="grid gap-1.5">
      <legend className="mb-1 text-note font-medium text-ink-2">Roles</legend>
      {roles.map((role) => (
        <label key={role} className="grid grid-cols-[14px_96px_1fr] items-start gap-x-2 text-small">
          <input
            type="checkbox"
            name={name}
            value={role}
            defaultChecked={held.includes(role)}
            className="mt-[1.5px] size-3.5 accent-(--copper)"
          />
          <span>{role}</span>
          <span className="text-note leading-[17px] text-ink-3">{roleJobs[role]}</span>
        </label>
      ))}
    </fieldset>
  );
}

/** What each role allows, for those who cannot change them. */
export function RoleLegend() {
  return (
    <section className="border-t-[1.5px] border-ink pt-2">
      <h2 className="mb-2 text-lead font-semibold">What the roles allow</h2>
      <dl className="grid grid-cols-[96px_1fr] gap-y-1.5 text-small">
        {roles.map((role) => (
          <div key={role} className="contents">
            <dt>{role}</dt>
            <dd className="text-ink-2">{roleJobs[role]}</dd>
          </div>
        ))}
      </dl>
      <p className="mt-2 text-note text-ink-3">A person may hold several; one of them is enough.</p>
    </section>
  );
}
