import { useMemo, useState } from "react";
import { FindingShape } from "~/components/notation/finding-badge";
import { Field, Input, Select } from "~/components/ui/field";
import { Segments } from "~/components/ui/segments";
import { formatProblem } from "~/domain/core/problem-texts";
import type { Direction, ProcessData } from "~/domain/iodd/device-description";
import { parseFrameText } from "~/domain/mapping/parse-frame-text";
import { viewFrame } from "./frame-fields";
import { FrameRuler } from "./frame-ruler";
import { FrameTable } from "./frame-table";
import { readFields } from "./read-fields";

type Props = {
  /** Product name, for the labels. */
  device: string;
  processData: readonly ProcessData[];
  profileCharacteristic: readonly number[];
  language?: string | undefined;
};

/** A device's process data to read and to try: both directions, every layout, with bytes pasted by hand. */
export function FrameReader({ device, processData, profileCharacteristic, language }: Props) {
  const directions = (["in", "out"] as const).filter((side) => processData.some((layout) => layout[side]));
  const [direction, setDirection] = useState<Direction>(directions[0] ?? "in");
  const layouts = processData.filter((layout) => layout[direction]);
  const [layoutId, setLayoutId] = useState<string | undefined>(undefined);
  const layout = layouts.find((one) => one.id === layoutId) ?? layouts[0];
  const image = layout?.[direction];
  const [look, setLook] = useState<"ruler" | "table">("ruler");
  const [text, setText] = useState("");
  const view = useMemo(
    () => image && viewFrame(image, { profileCharacteristic, ...(language ? { language } : {}) }),
    [image, profileCharacteristic, language],
  );
  const pasted = useMemo(() => (text.trim() === "" ? undefined : parseFrameText(text, direction)), [text, direction]);
  const read = view && pasted?.ok ? readFields(view, pasted.value.octets) : undefined;
  const readings = read?.ok ? read.readings : undefined;
  const problems = [...(pasted && !pasted.ok ? pasted.problems : []), ...(read && !read.ok ? read.problems : [])];

  if (!view)
    return (
      <p className="text-small text-ink-2">
        The description has no process data: this device is read by its parameters only.
      </p>
    );
  const label = `${device}, process data ${direction}`;
  return (
    <div className="grid gap-3">
      <div className="flex flex-wrap items-end gap-x-4 gap-y-2">
        {directions.length > 1 ? (
          <Segments
            label="Direction"
            value={direction}
            onChange={setDirection}
            options={[
              { value: "in", label: "In, from the device" },
              { value: "out", label: "Out, to the device" },
            ]}
          />
        ) : (
          <span className="py-1 text-small font-semibold">
            {direction === "in" ? "Process data in" : "Process data out"}
          </span>
        )}
        {layouts.length > 1 ? (
          <Field label="Layout while">
            {(tied) => (
              <Select
                {...tied}
                size="small"
                value={layout?.id ?? ""}
                onChange={(event) => setLayoutId(event.currentTarget.value)}
              >
                {layouts.map((one) => (
                  <option key={one.id} value={one.id}>
                    {one.condition ? `${one.condition.variableId} = ${one.condition.value}` : one.id}
                  </option>
                ))}
              </Select>
            )}
          </Field>
        ) : null}
        <span className="py-1 font-mono text-small text-ink-2">
          {image?.bitLength} bit, {view.octets} {view.octets === 1 ? "octet" : "octets"}
        </span>
        <Segments
          label="Show as"
          className="ml-auto"
          value={look}
          onChange={setLook}
          options={[
            { value: "ruler", label: "Ruler" },
            { value: "table", label: "Table" },
          ]}
        />
      </div>
      {look === "ruler" ? (
        <FrameRuler
          label={label}
          view={view}
          octets={read?.ok && pasted?.ok ? pasted.value.octets : undefined}
          readings={readings}
        />
      ) : (
        <FrameTable label={label} view={view} readings={readings} />
      )}
      <Field
        label="Try bytes"
        hint="Hexadecimal pairs, decimal octets, or a master's answer in JSON. Nothing is stored."
        errors={problems.length > 0 ? problems.map(formatProblem) : undefined}
        className="max-w-160"
      >
        {(tied) => (
          <Input
            {...tied}
            mono
            value={text}
            spellCheck={false}
            autoComplete="off"
            placeholder={Array.from({ length: Math.min(view.octets, 12) }, () => "00").join(" ")}
            onChange={(event) => setText(event.currentTarget.value)}
          />
        )}
      </Field>
      {pasted?.ok && !pasted.value.isValid ? (
        <p className="flex items-center gap-1.5 text-small">
          <FindingShape severity="warning" />
          The answer marks this process data as not valid: every node fed by it would be Bad.
        </p>
      ) : null}
    </div>
  );
}
