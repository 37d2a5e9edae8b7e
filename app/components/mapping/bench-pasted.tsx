import { Checkbox, Field, Input } from "~/components/ui/field";
import { formatProblem } from "~/domain/core/problem-texts";
import type { Direction } from "~/domain/iodd/device-description";
import { parseFrameText } from "~/domain/mapping/parse-frame-text";
import { toFrameId } from "./bench-inputs";
import { viewRoleFrame } from "./view-role-frame";
import type { MappingScene } from "./mapping-scene";
import type { BenchState } from "./use-bench";

/** One field for the bytes of each role and direction, one for each other value that the mapping reads. */
export function BenchPasted({ bench, scene }: { bench: BenchState; scene: MappingScene }) {
  const frames = scene.roleViews.flatMap(({ name, role }) =>
    (["in", "out"] as const).flatMap((direction) => {
      const view = viewRoleFrame(role, direction);
      return view ? [{ role: name, direction, octets: view.octets }] : [];
    }),
  );
  return (
    <div className="grid gap-3">
      {frames.map((frame) => (
        <FrameInput key={`${frame.role} ${frame.direction}`} bench={bench} {...frame} />
      ))}
      {bench.points.length > 0 ? (
        <fieldset className="grid grid-cols-2 gap-x-3 gap-y-2">
          <legend className="mb-1 text-small font-semibold">Other values</legend>
          {bench.points.map(({ id, label }) => (
            <Field key={id} label={label}>
              {(tied) => (
                <Input
                  {...tied}
                  size="small"
                  mono
                  value={bench.inputs.samples[id] ?? ""}
                  spellCheck={false}
                  autoComplete="off"
                  onChange={(event) => {
                    const { value } = event.currentTarget;
                    bench.setInputs((before) => ({ ...before, samples: { ...before.samples, [id]: value } }));
                  }}
                />
              )}
            </Field>
          ))}
        </fieldset>
      ) : null}
    </div>
  );
}

function FrameInput({
  bench,
  role,
  direction,
  octets,
}: {
  bench: BenchState;
  role: string;
  direction: Direction;
  octets: number;
}) {
  const id = toFrameId(role, direction);
  const { text = "", isValid = true } = bench.inputs.frames[id] ?? {};
  const parsed = text.trim() === "" ? undefined : parseFrameText(text, direction);
  const set = (change: { text?: string; isValid?: boolean }) =>
    bench.setInputs((before) => ({ ...before, frames: { ...before.frames, [id]: { text, isValid, ...change } } }));
  const count = parsed?.ok ? parsed.value.octets.length : undefined;
  return (
    <div>
      <Field
        label={`${role}, process data ${direction}`}
        errors={parsed && !parsed.ok ? parsed.problems.map(formatProblem) : undefined}
        hint={count === undefined ? `${octets} octets` : `${count} of ${octets} octets read`}
      >
        {(tied) => (
          <Input
            {...tied}
            mono
            value={text}
            spellCheck={false}
            autoComplete="off"
            placeholder={Array.from({ length: Math.min(octets, 14) }, () => "00").join(" ")}
            onChange={(event) => set({ text: event.currentTarget.value })}
          />
        )}
      </Field>
      <Checkbox
        className="mt-1"
        label={`Process data ${direction} valid`}
        checked={isValid && (!parsed?.ok || parsed.value.isValid)}
        disabled={parsed?.ok === true && !parsed.value.isValid}
        onChange={(event) => set({ isValid: event.currentTarget.checked })}
      />
    </div>
  );
}
