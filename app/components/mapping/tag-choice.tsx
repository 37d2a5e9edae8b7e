import { Choice } from "./choice";
import type { Roles } from "./describe-source";
import type { RoleTags } from "./use-tags";

/** Tag lists whose names suggestions may use, one for each role that is no IO-Link device. */
export function TagChoice({ roles, tags }: { roles: Roles; tags: RoleTags }) {
  const others = [...roles].filter(([, role]) => role.kind !== "io-link-device").map(([name]) => name);
  if (tags.lists.length === 0 || others.length === 0) return null;
  return (
    <div className="flex flex-wrap gap-3 px-5 pt-2">
      {others.map((role) => (
        <div key={role} className="w-56">
          <Choice
            label={`Tags of ${role}`}
            value={tags.chosen[role] ?? ""}
            options={[
              ["", "none"] as const,
              ...tags.lists.map((list) => [list.id, `${list.name}, ${list.count}`] as const),
            ]}
            onChange={(id) => tags.choose(role, id)}
          />
        </div>
      ))}
    </div>
  );
}
