import { ChevronLeft, ChevronRight } from "lucide-react";
import { useState } from "react";
import { IconButton } from "~/components/ui/button";
import { Field, Select } from "~/components/ui/field";
import { formatProblem } from "~/domain/core/problem-texts";
import type { Problem } from "~/domain/core/result";
import { formatHex } from "~/domain/mapping/bits";
import { parseRecording, type RecordedFrame } from "./parse-recording";
import { toFrameId } from "./bench-inputs";
import type { MappingScene } from "./mapping-scene";
import type { BenchState } from "./use-bench";

/** A recorded file: which port is which role, and which frame lies on the bench. */
export function BenchRecorded({ bench, scene }: { bench: BenchState; scene: MappingScene }) {
  const [frames, setFrames] = useState<readonly RecordedFrame[]>([]);
  const [problems, setProblems] = useState<readonly Problem[]>([]);
  const [roles, setRoles] = useState<Readonly<Record<string, string>>>({});
  const [at, setAt] = useState(0);
  const ports = [...new Set(frames.map((frame) => frame.port))];
  const inputs = scene.roleViews.filter(({ role }) => role.layouts?.in).map(({ name }) => name);

  /** All frames up to the chosen one have come: each role has its last. */
  function lay(list: readonly RecordedFrame[], index: number, named: Readonly<Record<string, string>>): void {
    setAt(index);
    const last = new Map<string, RecordedFrame>();
    for (const frame of list.slice(0, index + 1)) {
      const role = named[frame.port];
      if (role) last.set(role, frame);
    }
    bench.setInputs((before) => ({
      ...before,
      frames: {
        ...before.frames,
        ...Object.fromEntries(
          [...last].map(([role, frame]) => [toFrameId(role, "in"), { text: formatHex(frame.octets), isValid: true }]),
        ),
      },
    }));
  }
  async function choose(file: File | undefined): Promise<void> {
    if (!file) return;
    const read = parseRecording(await file.text());
    setProblems(read.problems);
    if (!read.ok) return setFrames([]);
    const found = [...new Set(read.value.map((frame) => frame.port))];
    const named = Object.fromEntries(found.map((port, i) => [port, inputs.includes(port) ? port : (inputs[i] ?? "")]));
    setFrames(read.value);
    setRoles(named);
    lay(read.value, 0, named);
  }
  const frame = frames[at];
  return (
    <div className="grid gap-3 border-b border-rule pb-3">
      <Field label="Recorded file" hint="CSV with a head: time, port, hex.">
        {(tied) => (
          <input
            {...tied}
            type="file"
            accept=".csv,text/csv,text/plain"
            onChange={(event) => void choose(event.currentTarget.files?.[0])}
            className="text-small file:mr-3 file:h-7 file:rounded-edge file:border file:border-edge file:bg-leaf file:px-2.5 file:text-small file:font-medium"
          />
        )}
      </Field>
      {problems.slice(0, 5).map((problem, i) => (
        <p key={`${problem.code} ${i}`} className="text-small text-error">
          {problem.at?.line === undefined ? "" : `Line ${problem.at.line}: `}
          {formatProblem(problem)}
        </p>
      ))}
      {problems.length > 5 ? <p className="text-note text-ink-3">and {problems.length - 5} more</p> : null}
      {frame ? (
        <>
          <div className="grid grid-cols-2 gap-3">
            {ports.map((port) => (
              <Field key={port} label={`Port ${port} is`}>
                {(tied) => (
                  <Select
                    {...tied}
                    size="small"
                    value={roles[port] ?? ""}
                    onChange={(event) => {
                      const next = { ...roles, [port]: event.currentTarget.value };
                      setRoles(next);
                      lay(frames, at, next);
                    }}
                  >
                    <option value="">not read</option>
                    {inputs.map((name) => (
                      <option key={name} value={name}>
                        {name}
                      </option>
                    ))}
                  </Select>
                )}
              </Field>
            ))}
          </div>
          <div className="flex items-center gap-2">
            <IconButton
              icon={ChevronLeft}
              label="Frame before"
              size="small"
              {...(at === 0 ? { blockedBy: "is the first" } : {})}
              onClick={() => lay(frames, at - 1, roles)}
            />
            <input
              type="range"
              aria-label="Frame"
              min={0}
              max={frames.length - 1}
              value={at}
              aria-valuetext={`frame ${at + 1} of ${frames.length}`}
              className="flex-1 accent-(--copper)"
              onChange={(event) => lay(frames, Number(event.currentTarget.value), roles)}
            />
            <IconButton
              icon={ChevronRight}
              label="Frame after"
              size="small"
              {...(at === frames.length - 1 ? { blockedBy: "is the last" } : {})}
              onClick={() => lay(frames, at + 1, roles)}
            />
            <span className="w-52 truncate text-right font-mono text-note text-ink-2">
              {at + 1} of {frames.length}, {frame.time}
            </span>
          </div>
        </>
      ) : null}
    </div>
  );
}
