import { useState } from "react";
import { FindingShape } from "~/components/notation/finding-badge";
import { Button } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Segments } from "~/components/ui/segments";
import { formatProblem } from "~/domain/core/problem-texts";
import type { SourceView } from "~/services/read-sources.server";
import { BenchLive } from "./bench-live";
import { BenchPasted } from "./bench-pasted";
import { BenchRecorded } from "./bench-recorded";
import { BenchResults } from "./bench-results";
import { CheckCases } from "./check-cases";
import { noInputs } from "./bench-inputs";
import type { MappingScene } from "./mapping-scene";
import type { BenchState } from "./use-bench";
import type { MappingActions } from "./use-mapping-actions";

type Props = { bench: BenchState; scene: MappingScene; sources: readonly SourceView[]; actions: MappingActions };
type From = "pasted" | "recorded" | "live";

/** Bytes go in at the left, nodes come out at the right, with the path of each step. */
export function Bench({ bench, scene, sources, actions }: Props) {
  const [from, setFrom] = useState<From>("pasted");
  if (scene.roles.size === 0)
    return (
      <Empty title="Nothing to decode yet" className="m-5">
        Add a source and map a field first: the bench then shows what bytes become.
      </Empty>
    );
  return (
    <div className="grid min-h-0 flex-1 grid-cols-[minmax(380px,2fr)_minmax(0,3fr)] divide-x divide-rule overflow-hidden">
      <section
        aria-label="Input"
        className="grid grid-cols-[minmax(0,1fr)] content-start gap-4 overflow-y-auto px-5 py-3"
      >
        <div className="flex items-center gap-3">
          <Segments
            label="Bytes from"
            value={from}
            onChange={setFrom}
            options={[
              { value: "pasted", label: "Pasted" },
              { value: "recorded", label: "Recorded" },
              { value: "live", label: "From a source" },
            ]}
          />
          <Button size="small" tone="bare" className="ml-auto" onClick={() => bench.setInputs(() => noInputs)}>
            Clear
          </Button>
        </div>
        {from === "recorded" ? <BenchRecorded bench={bench} scene={scene} /> : null}
        {from === "live" ? <BenchLive bench={bench} scene={scene} sources={sources} /> : null}
        <BenchPasted bench={bench} scene={scene} />
        <p className="text-note text-ink-3">
          The same functions decode here, in the checker and in the test server. Nothing is written to a device.
        </p>
      </section>
      <section aria-label="Result" className="space-y-5 overflow-y-auto px-5 py-3">
        {bench.problems.map((problem, i) => (
          <p key={`${problem.code} ${i}`} className="flex items-start gap-1.5 text-small">
            <span className="pt-0.5">
              <FindingShape severity={problem.severity} />
            </span>
            <span>
              {problem.at?.path ? <span className="font-semibold">{problem.at.path}: </span> : null}
              {formatProblem(problem)}
            </span>
          </p>
        ))}
        <BenchResults scene={scene} readings={bench.readings} />
        <CheckCases bench={bench} scene={scene} actions={actions} />
      </section>
    </div>
  );
}
