import { Check, X } from "lucide-react";
import { FerruleBadge } from "~/components/notation/ferrule-badge";
import { Button } from "~/components/ui/button";
import { Icon } from "~/components/ui/icon";
import type { Suggestion } from "~/domain/mapping/suggest-rows";
import { describeSource, type Roles } from "./describe-source";
import { describeChain } from "./describe-transform";
import type { MappingActions } from "./use-mapping-actions";

type Props = {
  suggestions: readonly Suggestion[];
  roles: Roles;
  actions: MappingActions;
  onAccept: (suggestion: Suggestion) => void;
  /** Absent where the list shows a single one. */
  onAcceptAll?: () => void;
  onRefuse: (suggestion: Suggestion) => void;
};

/** Pairs with the signs that speak for and against them; a person decides. */
export function SuggestionList({ suggestions, roles, actions, onAccept, onAcceptAll, onRefuse }: Props) {
  if (suggestions.length === 0)
    return (
      <p className="px-5 py-3 text-small text-ink-2">
        No pair is likely enough: every field whose name, unit or type fits a free Variable is mapped or refused.
      </p>
    );
  return (
    <div className="px-5 py-2">
      {onAcceptAll ? (
        <div className="mb-1 flex items-center gap-3 text-small text-ink-2">
          <span>
            <span className="font-mono">{suggestions.length}</span> open
          </span>
          <Button size="small" blockedBy={actions.blockedBy} onClick={onAcceptAll}>
            Accept all
          </Button>
        </div>
      ) : null}
      <ul aria-label="Suggestions" className="border-t border-ink">
        {suggestions.map((suggestion) => (
          <li
            key={suggestion.target}
            className="grid grid-cols-[20px_minmax(0,2fr)_minmax(0,3fr)_auto_auto] items-start gap-3 border-b border-hair py-1.5 text-small"
          >
            <span className="pt-0.5">
              <FerruleBadge feed="suggested" />
            </span>
            <span className="min-w-0">
              <span className="font-semibold">{describeSource(suggestion.source, roles)}</span> →{" "}
              <span className="font-semibold">{suggestion.path}</span>
              {suggestion.transforms.length > 0 ? (
                <span className="ml-1.5 font-mono text-note text-ink-2">{describeChain(suggestion.transforms)}</span>
              ) : null}
            </span>
            <ul className="flex flex-wrap gap-x-4 gap-y-0.5 text-ink-2">
              {suggestion.reasons.map((reason) => (
                <li key={reason.text} className="flex items-center gap-1">
                  <Icon of={Check} className="shrink-0 text-good" /> {reason.text}
                </li>
              ))}
            </ul>
            <span className="pt-0.5 font-mono text-note text-ink-3">{Math.round(suggestion.score * 100)} %</span>
            <span className="flex gap-1">
              <Button
                size="small"
                tone="ink"
                icon={Check}
                blockedBy={actions.blockedBy}
                aria-label={`Accept ${suggestion.path}`}
                onClick={() => onAccept(suggestion)}
              >
                Accept
              </Button>
              <Button
                size="small"
                icon={X}
                aria-label={`Refuse ${suggestion.path}`}
                onClick={() => onRefuse(suggestion)}
              >
                Refuse
              </Button>
            </span>
          </li>
        ))}
      </ul>
    </div>
  );
}
