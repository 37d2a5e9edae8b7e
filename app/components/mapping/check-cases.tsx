import { Check, X } from "lucide-react";
import { useMemo, useState, type FormEvent } from "react";
import { FindingShape } from "~/components/notation/finding-badge";
import { useSpace } from "~/components/model/use-model";
import { Button, IconButton } from "~/components/ui/button";
import { Field, Input } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Block } from "~/components/ui/page";
import { formatProblem } from "~/domain/core/problem-texts";
import { formatMiss, runCheckCases } from "~/domain/mapping/run-check-cases";
import { fromCheckCase, makeCheckCase } from "./bench-inputs";
import type { MappingScene } from "./mapping-scene";
import type { BenchState } from "./use-bench";
import type { MappingActions } from "./use-mapping-actions";

type Props = { bench: BenchState; scene: MappingScene; actions: MappingActions };

/** Recorded input with the values expected from it; all run at every change, and with the checker. */
export function CheckCases({ bench, scene, actions }: Props) {
  const space = useSpace();
  const results = useMemo(() => runCheckCases(space, scene.type), [space, scene]);
  const byId = new Map(results.ok ? results.value.map((result) => [result.id, result]) : []);
  const failed = results.ok
    ? results.value.filter((result) => result.misses.length > 0 || result.problems.length > 0).length
    : scene.cases.length;
  return (
    <Block
      title="Check cases"
      about={
        scene.cases.length === 0 ? undefined : (
          <>
            <span className="font-mono">{scene.cases.length - failed}</span> of{" "}
            <span className="font-mono">{scene.cases.length}</span> pass
          </>
        )
      }
    >
      <SaveCase bench={bench} scene={scene} actions={actions} />
      {scene.cases.length === 0 ? (
        <p className="mt-2 text-small text-ink-2">
          None yet. Lay bytes on the bench whose values you know, look at the result, and save it: from then on every
          change is held against it.
        </p>
      ) : (
        <ul aria-label="Check cases" className="mt-3 border-t border-ink">
          {scene.cases.map(({ id, value }) => {
            const result = byId.get(id);
            const isPassed = result !== undefined && result.misses.length === 0 && result.problems.length === 0;
            return (
              <li
                key={id}
                className="grid grid-cols-[16px_minmax(0,1fr)_auto] items-start gap-2 border-b border-hair py-1.5 text-small"
              >
                <span className="pt-0.5">
                  {isPassed ? (
                    <Icon of={Check} className="text-good" label="passes" />
                  ) : (
                    <FindingShape severity="error" />
                  )}
                </span>
                <span className="min-w-0">
                  <span className="font-semibold">{value.name}</span>{" "}
                  <span className="text-ink-2">{isPassed ? "passes" : "fails"}</span>
                  <span className="ml-2 font-mono text-note text-ink-3">
                    {value.frames.length} {value.frames.length === 1 ? "frame" : "frames"}, {value.expected.length}{" "}
                    expected
                  </span>
                  {[...(result?.problems ?? []).map(formatProblem), ...(result?.misses ?? []).map(formatMiss)].map(
                    (text) => (
                      <span key={text} className="block text-error">
                        {text}
                      </span>
                    ),
                  )}
                </span>
                <span className="flex gap-1">
                  <Button size="small" onClick={() => bench.setInputs(() => fromCheckCase(value))}>
                    Lay on the bench
                  </Button>
                  <IconButton
                    icon={X}
                    size="small"
                    label={`Remove ${value.name}`}
                    {...(actions.blockedBy === undefined ? {} : { blockedBy: actions.blockedBy })}
                    onClick={() => actions.setCase(id, undefined)}
                  />
                </span>
              </li>
            );
          })}
        </ul>
      )}
    </Block>
  );
}

function SaveCase({ bench, scene, actions }: Props) {
  const [name, setName] = useState("");
  const isEmpty = bench.readings.size === 0;
  function save(event: FormEvent): void {
    event.preventDefault();
    const value = makeCheckCase(name.trim(), bench.inputs, scene, bench.readings);
    const same = scene.cases.find((one) => one.value.name === value.name);
    if (actions.setCase(same?.id ?? `case-${crypto.randomUUID()}`, value)) setName("");
  }
  return (
    <form onSubmit={save} className="flex items-end gap-3">
      <Field label="Save the bench as" className="w-64">
        {(tied) => (
          <Input
            {...tied}
            size="small"
            value={name}
            maxLength={200}
            placeholder="creel half full"
            onChange={(event) => setName(event.currentTarget.value)}
          />
        )}
      </Field>
      <Button
        type="submit"
        size="small"
        tone="main"
        blockedBy={
          actions.blockedBy ??
          (isEmpty ? "there is nothing on the bench" : name.trim() === "" ? "it needs a name" : undefined)
        }
      >
        Save as check case
      </Button>
    </form>
  );
}
