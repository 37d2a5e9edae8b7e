import { useMemo } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { Checkbox } from "../ui/field";
import { previewInstance } from "./offered-members";

type Props = { space: AddressSpace; parent: NodeKey; type: NodeKey; chosen: readonly string[]; onChoose: (paths: readonly string[]) => void };

/** What comes with the type, and a tick list of what may be chosen beside it. */
export function OptionalMembers({ space, parent, type, chosen, onChoose }: Props) {
  const preview = useMemo(() => previewInstance(space, parent, type, chosen), [space, parent, type, chosen]);
  if (!preview || (preview.offered.length === 0 && preview.mandatory.length === 0)) return null;
  // What is chosen is no longer offered by the preview, so it is listed from the choice.
  const offered = preview.offered.filter((member) => !member.isPlaceholder);
  const rows = [...chosen.map((path) => ({ path, isChosen: true })), ...offered.map(({ path }) => ({ path, isChosen: false }))];
  rows.sort((a, b) => a.path.localeCompare(b.path, "en"));

  function toggle(path: string, isChosen: boolean): void {
    onChoose(isChosen ? [...chosen, path] : chosen.filter((other) => other !== path && !other.startsWith(`${path}/`)));
  }

  return (
    <fieldset className="optional-members">
      <legend>Members of its type</legend>
      {preview.mandatory.length > 0 ? (
        <p>
          <span className="font-mono">{preview.mandatory.length}</span> made by themselves: {preview.mandatory.slice(0, 8).join(", ")}
          {preview.mandatory.length > 8 ? " …" : ""}
        </p>
      ) : null}
      {rows.length > 0 ? (
        <ul>
          {rows.map((row) => (
            <li key={row.path}>
              <Checkbox label={row.path.replaceAll("/", " / ")} checked={row.isChosen} onChange={(event) => toggle(row.path, event.currentTarget.checked)} />
            </li>
          ))}
        </ul>
      ) : null}
    </fieldset>
  );
}
