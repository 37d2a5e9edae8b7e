import { Redo2, Undo2 } from "lucide-react";
import { useSyncExternalStore } from "react";
import { IconButton } from "../ui/button";
import { Initials } from "../ui/initials";
import { SaveState } from "./save-state";
import { useEditorState, useOpenModel } from "./use-model";

/** In the bar of a model: who else is here, undo and redo, and whether everything is saved. */
export function ModelTools() {
  const { actions, workspace } = useOpenModel();
  const mayMap = workspace.permissions.includes("mapping.edit");
  const { undoLabel, redoLabel } = useEditorState();
  return (
    <>
      <PeopleHere />
      {actions.canEdit || mayMap ? (
        <>
          <IconButton icon={Undo2} label="Undo" keys="Ctrl Z" onClick={() => actions.undo()} {...(undoLabel === undefined ? { blockedBy: "nothing to undo" } : {})} />
          <IconButton icon={Redo2} label="Redo" keys="Ctrl Shift Z" onClick={() => actions.redo()} {...(redoLabel === undefined ? { blockedBy: "nothing to redo" } : {})} />
          <span className="mx-1 text-note whitespace-nowrap text-ink-3">
            <SaveState />
          </span>
        </>
      ) : (
        <span className="mx-1 text-note whitespace-nowrap text-ink-3">read only</span>
      )}
    </>
  );
}

const MOST = 4;

function PeopleHere() {
  const { presence } = useOpenModel();
  const people = useSyncExternalStore(presence.subscribe, presence.getPeople, presence.getPeople);
  if (people.length === 0) return null;
  return (
    <span className="flex items-center gap-1" role="group" aria-label="Also here">
      {people.slice(0, MOST).map((person) => (
        <span key={person.clientId} title={`${person.name}${person.place ? ` on the ${person.place}` : ""}`}>
          <Initials name={person.name} tone="mate" small />
          <span className="sr-only">{person.name}</span>
        </span>
      ))}
      {people.length > MOST ? <span className="text-note text-ink-3">and {people.length - MOST} more</span> : null}
    </span>
  );
}
