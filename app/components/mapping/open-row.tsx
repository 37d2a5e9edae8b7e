import { useState } from "react";
import { Button } from "~/components/ui/button";
import type { RowContent } from "~/domain/mapping/mapping";
import type { Suggestion } from "~/domain/mapping/suggest-rows";
import { makeReference } from "./make-reference";
import type { Member } from "./mapping-scene";
import type { Roles } from "./describe-source";
import { SourceEditor } from "./source-editor";
import { SuggestionList } from "./suggestion-list";
import type { MappingActions } from "./use-mapping-actions";

type Props = {
  member: Member;
  members: readonly Member[];
  roles: Roles;
  suggestion: Suggestion | undefined;
  actions: MappingActions;
  onAccept: (suggestion: Suggestion) => void;
  onRefuse: (suggestion: Suggestion) => void;
};

/** A Variable that nothing feeds: the suggestion for it, or any source chosen by hand. */
export function OpenRow({ member, members, roles, suggestion, actions, onAccept, onRefuse }: Props) {
  const [source, setSource] = useState<RowContent["source"]>(() =>
    makeReference(roles.size > 0 ? "process-data" : "constant", roles),
  );
  return (
    <div className="grid grid-cols-[minmax(280px,1fr)_minmax(0,2fr)] gap-6 px-5 py-3">
      <fieldset disabled={actions.blockedBy !== undefined} className="grid min-w-0 content-start gap-3">
        <legend className="mb-1 text-small font-semibold">Choose a source by hand</legend>
        <SourceEditor source={source} roles={roles} members={members} target={member.target} onChange={setSource} />
        <Button
          tone="main"
          size="small"
          className="justify-self-start"
          blockedBy={actions.blockedBy}
          onClick={() =>
            source.kind === "process-data" && source.direction === "in"
              ? actions.mapField(member.target.target, source)
              : actions.setRow(member.id, { source, transforms: [], period: 500 })
          }
        >
          Feed it from here
        </Button>
      </fieldset>
      <section aria-label="Suggestion for this Variable" className="min-w-0">
        <h3 className="mb-1 text-small font-semibold">Suggestion</h3>
        {suggestion ? (
          <SuggestionList
            suggestions={[suggestion]}
            roles={roles}
            actions={actions}
            onAccept={onAccept}
            onRefuse={onRefuse}
          />
        ) : (
          <p className="text-small text-ink-2">
            No field or tag is likely enough. Drag a field onto the Variable, or choose a source at the left.
          </p>
        )}
      </section>
    </div>
  );
}
