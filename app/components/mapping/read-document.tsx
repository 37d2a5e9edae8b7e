import { useState } from "react";
import { describe } from "~/components/model/edit-steps";
import { useSpace } from "~/components/model/use-model";
import { FindingShape } from "~/components/notation/finding-badge";
import { Field } from "~/components/ui/field";
import { Block } from "~/components/ui/page";
import { showToast } from "~/components/ui/toast";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Problem } from "~/domain/core/result";
import { applyMappingDocument } from "~/domain/deliver/make-mapping-document";
import { readMappingDocument } from "~/domain/deliver/mapping-document";
import { useMappingActions } from "./use-mapping-actions";

const MOST = 20;

/** A mapping document read back: the type's mapping becomes equal to it, in one step that undo takes back. */
export function ReadDocument({ type }: { type: NodeKey }) {
  const space = useSpace();
  const actions = useMappingActions(type);
  const [problems, setProblems] = useState<readonly Problem[]>([]);

  async function read(file: File | undefined): Promise<void> {
    if (!file) return;
    const document = readMappingDocument(await file.text());
    const operations = document.ok ? applyMappingDocument(space, type, document.value) : document;
    setProblems(operations.problems);
    if (!operations.ok) return;
    if (operations.value.length === 0) {
      showToast({ tone: "good", title: "The mapping is the same already", detail: "Nothing was changed." });
    } else if (actions.dispatch("read-mapping-document", operations.value)) {
      showToast({
        tone: "good",
        title: "The mapping was read",
        detail: `${operations.value.length} entries changed. Undo takes all of them back in one step.`,
      });
    }
  }
  return (
    <Block title="Read a mapping document" about="Sources, rows and check cases become those of the document.">
      <fieldset disabled={actions.blockedBy !== undefined}>
        <Field
          label="Mapping document"
          hint={
            actions.blockedBy
              ? `This ${actions.blockedBy}.`
              : "JSON of the published schema. Nothing is changed when one of its members is not in the type."
          }
        >
          {(tied) => (
            <input
              {...tied}
              type="file"
              accept=".json,application/json"
              onChange={(event) => {
                const input = event.currentTarget;
                void read(input.files?.[0]).then(() => (input.value = ""));
              }}
              className="text-small file:mr-3 file:h-7 file:rounded-edge file:border file:border-edge file:bg-leaf file:px-2.5 file:text-small file:font-medium"
            />
          )}
        </Field>
      </fieldset>
      {problems.length > 0 ? (
        <ul aria-label="Problems of the document" className="mt-2 border-t border-ink">
          {problems.slice(0, MOST).map((problem, i) => (
            <li key={`${problem.code} ${i}`} className="flex items-start gap-1.5 border-b border-hair py-1 text-small">
              <span className="pt-0.5">
                <FindingShape severity={problem.severity} />
              </span>
              {problem.at?.path ? <code>{problem.at.path}</code> : null}
              {describe(space, [problem]).join(" ")}
            </li>
          ))}
          {problems.length > MOST ? (
            <li className="py-1 text-note text-ink-3">and {problems.length - MOST} more</li>
          ) : null}
        </ul>
      ) : null}
    </Block>
  );
}
