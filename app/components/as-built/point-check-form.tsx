import { Activity } from "lucide-react";
import { useState } from "react";
import { Form } from "react-router";
import type { NodeCard } from "~/domain/live/live-node";
import type { AsBuiltPage, Signal } from "~/presenters/as-built-page.server";
import { Button } from "../ui/button";
import { Combobox } from "../ui/combobox";
import { Field, Input, Select } from "../ui/field";

type Props = Pick<AsBuiltPage, "signals" | "targets"> & { blockedBy: string | undefined };

const MAX_HITS = 30;

/** One check as it is made at the machine: choose the signal, take what the server shows, note what was read beside it. */
export function PointCheckForm({ signals, targets, blockedBy }: Props) {
  const [query, setQuery] = useState("");
  const [signal, setSignal] = useState<Signal>();
  const [serverId, setServerId] = useState(targets[0]?.id ?? "");
  const [shown, setShown] = useState("");
  const [unit, setUnit] = useState("");
  const [trouble, setTrouble] = useState<string>();
  const [isReading, setReading] = useState(false);
  const take = async (): Promise<void> => {
    if (!signal) return;
    setReading(true);
    const answer = await readShown(serverId, signal.nodeId);
    setReading(false);
    setTrouble(typeof answer === "string" ? answer : undefined);
    if (typeof answer === "string") return;
    setShown(String(answer.value));
    if (answer.unit !== "") setUnit(answer.unit);
  };
  return (
    <Form method="post" className="mt-3 grid gap-3">
      <input type="hidden" name="intent" value="point-check" />
      <input type="hidden" name="nodeId" value={signal?.nodeId ?? ""} />
      <div className="flex flex-wrap items-end gap-3">
        <Field label="Signal" className="w-96">
          {(tied) => (
            <Combobox<Signal>
              label="Signal"
              {...tied}
              query={query}
              onQuery={(text) => {
                setQuery(text);
                setSignal(undefined);
              }}
              items={findSignals(signals, query)}
              itemKey={(item) => item.nodeId}
              renderItem={(item) => <span className="font-mono text-small">{item.path}</span>}
              onPick={(item) => {
                setSignal(item);
                setQuery(item.path);
                setShown("");
              }}
              placeholder="B1 spindle"
              none="No measured value of the model's machines has such a path"
              mono
            />
          )}
        </Field>
        <Field label="Shown by" className="w-64">
          {(tied) => (
            <Select {...tied} value={serverId} onChange={(event) => setServerId(event.target.value)}>
              {targets.map((target) => (
                <option key={target.id} value={target.id}>
                  {target.name}
                </option>
              ))}
            </Select>
          )}
        </Field>
        <Button icon={Activity} busy={isReading} onClick={() => void take()} blockedBy={signal === undefined ? "Choose a signal first" : serverId === "" ? "No server can be read" : undefined}>
          Take the value that it shows
        </Button>
      </div>
      {trouble === undefined ? null : (
        <p role="alert" className="text-small text-error">
          {trouble}
        </p>
      )}
      <div className="flex flex-wrap items-end gap-3">
        <Field label="Stimulus" className="w-64">
          {(tied) => <Input {...tied} name="stimulus" required placeholder="ice water at the sensor" />}
        </Field>
        <Field label="Read beside it" className="w-28">
          {(tied) => <Input {...tied} name="localReading" type="number" step="any" required mono />}
        </Field>
        <Field label="Shown" className="w-28">
          {(tied) => <Input {...tied} name="shownValue" type="number" step="any" required mono value={shown} onChange={(event) => setShown(event.target.value)} />}
        </Field>
        <Field label="Tolerance ±" className="w-28">
          {(tied) => <Input {...tied} name="tolerance" type="number" step="any" min={0} required mono />}
        </Field>
        <Field label="Unit" optional className="w-20">
          {(tied) => <Input {...tied} name="unit" mono value={unit} onChange={(event) => setUnit(event.target.value)} />}
        </Field>
        <Field label="Note" optional className="w-56">
          {(tied) => <Input {...tied} name="note" />}
        </Field>
        <Button type="submit" blockedBy={blockedBy ?? (signal === undefined ? "Choose a signal first" : undefined)}>
          Record the check
        </Button>
      </div>
    </Form>
  );
}

/** Every word of the query stands somewhere in the path. */
function findSignals(signals: readonly Signal[], query: string): Signal[] {
  const words = query.toLowerCase().split(/[\s/]+/).filter(Boolean);
  const hits: Signal[] = [];
  for (const signal of signals) {
    if (hits.length >= MAX_HITS) break;
    const path = signal.path.toLowerCase();
    if (words.every((word) => path.includes(word))) hits.push(signal);
  }
  return hits;
}

/** The number that the server shows now, or a sentence that says why there is none. */
async function readShown(serverId: string, nodeId: string): Promise<{ value: number; unit: string } | string> {
  const answer = await fetch(`/live/${serverId}/node?${new URLSearchParams({ node: nodeId }).toString()}`).catch(() => undefined);
  if (!answer?.ok) return "The server does not answer, or does not know the signal.";
  const card = (await answer.json()) as NodeCard;
  const { sample } = card;
  if (typeof sample?.value !== "number") return `The server shows no number: ${sample?.status.name ?? "no value"}.`;
  if (sample.status.severity === "bad") return `The server shows ${sample.status.name}.`;
  return { value: Number(sample.value.toPrecision(7)), unit: card.unit?.text ?? "" };
}
