/** Edits of a DataType: what they do to values is told first, and the person decides what becomes of those. */
import { useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { numericNodeId, type NodeKey } from "~/domain/address-space/node-id";
import { getOwnNamespace } from "~/domain/address-space/model-header";
import { ok } from "~/domain/core/result";
import { applyOperations } from "~/domain/editing/apply-operation";
import type { CommandContext } from "~/domain/editing/edit-draft";
import { convertValues, listValueMisfits, type ValueMisfit } from "~/domain/editing/misfit-values";
import { composeEdit, type EditStep } from "../model/edit-steps";
import { formatPath } from "../model/member-facts";
import { useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { Notice } from "../ui/notice";

type Pending = {
  readonly label: string;
  readonly step: EditStep;
  readonly misfits: readonly ValueMisfit[];
  readonly renamed: ReadonlyMap<string, string>;
};

export type DataTypeEdit = {
  readonly pending: Pending | undefined;
  readonly refusal: readonly string[];
  /** Counts refusals and withdrawals, so that fields show again what is. */
  readonly turn: number;
  /** `renamed`: old field names by new ones. */
  edit(label: string, step: EditStep, renamed?: ReadonlyMap<string, string>): void;
  apply(converts: boolean): void;
  withdraw(): void;
};

/** Numbers for a trial that is thrown away: from the end of the range, so that no lease is touched. */
function makeTrialContext(space: AddressSpace): CommandContext {
  let next = 4_294_967_295;
  return { allocate: () => ok(numericNodeId(getOwnNamespace(space.own.header), next--)) };
}

export function useDataTypeEdit(space: AddressSpace, dataType: NodeKey): DataTypeEdit {
  const { actions } = useOpenModel();
  const [pending, setPending] = useState<Pending>();
  const [refusal, setRefusal] = useState<readonly string[]>([]);
  const [turn, setTurn] = useState(0);

  function edit(label: string, step: EditStep, renamed: ReadonlyMap<string, string> = new Map()): void {
    const trial = composeEdit(space, makeTrialContext(space), [step]);
    if (!trial.ok) {
      setRefusal(trial.reasons);
      setTurn((n) => n + 1);
      return;
    }
    setRefusal([]);
    const after = applyOperations(space, trial.operations);
    const misfits = after.ok ? listValueMisfits(space, after.value, dataType) : [];
    if (misfits.length === 0) actions.apply(label, step);
    else setPending({ label, step, misfits, renamed });
  }

  function apply(converts: boolean): void {
    if (!pending) return;
    const { label, step, misfits, renamed } = pending;
    const intent = { before: space, nodes: misfits.map((misfit) => misfit.node), renamed };
    actions.apply(
      label,
      step,
      ...(converts
        ? [(current: AddressSpace, context: CommandContext) => convertValues(current, context, intent)]
        : []),
    );
    setPending(undefined);
  }

  function withdraw(): void {
    setPending(undefined);
    setTurn((n) => n + 1);
  }
  return { pending, refusal, turn, edit, apply, withdraw };
}

const WORDS: Readonly<Record<ValueMisfit["kind"], string>> = {
  unreadable: "does not fit any more",
  incomplete: "would be written differently",
  unnamed: "holds what has no name any more",
};

const MOST = 6;

/** What the edit would do, and the three ways on. */
export function Consequences({ space, edit }: { space: AddressSpace; edit: DataTypeEdit }) {
  const { view } = useOpenModel();
  const { pending, refusal } = edit;
  if (refusal.length > 0) {
    return (
      <Notice tone="error" live className="mt-2">
        {refusal.join(" ")}
      </Notice>
    );
  }
  if (!pending) return null;
  const { misfits } = pending;
  return (
    <div role="group" aria-label="Consequences" className="mt-2">
      <Notice
        tone="warning"
        live
        title={`This changes what ${misfits.length === 1 ? "one value is" : `${misfits.length} values are`}. Nothing is done yet.`}
      >
        <ul className="my-1">
          {misfits.slice(0, MOST).map(({ node, kind }) => (
            <li key={node}>
              <button
                type="button"
                className="underline decoration-rule underline-offset-3 hover:text-copper"
                onClick={() => view.reveal(node)}
              >
                {formatPath(space, node)}
              </button>{" "}
              <span className="text-ink-2">{WORDS[kind]}</span>
            </li>
          ))}
          {misfits.length > MOST ? <li className="text-ink-2">and {misfits.length - MOST} more</li> : null}
        </ul>
        <p className="mb-1.5 text-ink-2">
          Rewritten values keep the fields of the same name; new ones get the default of their type.
        </p>
        <span className="flex flex-wrap gap-2">
          <Button size="small" tone="ink" autoFocus onClick={() => edit.apply(true)}>
            Apply and rewrite the values
          </Button>
          <Button size="small" onClick={() => edit.apply(false)}>
            Apply, leave the values
          </Button>
          <Button size="small" tone="bare" onClick={() => edit.withdraw()}>
            Do not
          </Button>
        </span>
      </Notice>
    </div>
  );
}
