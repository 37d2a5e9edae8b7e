import { Pause, Play, RefreshCw } from "lucide-react";
import { useEffect, useRef, useState } from "react";
import { FindingShape } from "~/components/notation/finding-badge";
import { StatusBadge } from "~/components/notation/status-badge";
import { Button } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Field, Select } from "~/components/ui/field";
import { readRegister } from "~/domain/mapping/plan-readings";
import type { SourceView } from "~/services/read-sources.server";
import { readPort, readRegisters } from "../sources/read-port";
import { toFrameId } from "./bench-inputs";
import { chooseFor, listPlaces, listRegisterPlaces, type RegisterPlace } from "./bench-places";
import type { MappingScene } from "./mapping-scene";
import type { BenchState } from "./use-bench";

const EVERY_MS = 1_000;

/** Live bytes from the ports of masters: once, or every second. */
export function BenchLive({
  bench,
  scene,
  sources,
}: {
  bench: BenchState;
  scene: MappingScene;
  sources: readonly SourceView[];
}) {
  const places = listPlaces(sources);
  const roles = scene.roleViews.filter(({ role }) => role.kind === "io-link-device").map(({ name }) => name);
  const machines = [...new Set(places.flatMap((place) => place.machine ?? []))];
  const [machine, setMachine] = useState(machines[0]);
  const registers = listRegisterPlaces(bench.points, sources, machine);
  const [chosen, setChosen] = useState<Readonly<Record<string, string>>>(() => chooseFor(places, roles, machines[0]));
  const [isFollowing, setFollowing] = useState(false);
  const [isBusy, setBusy] = useState(false);
  const [state, setState] = useState<{ failures: readonly string[]; at: string } | undefined>(undefined);
  const latest = useRef({ chosen, registers });
  latest.current = { chosen, registers };

  async function readAll(): Promise<void> {
    const wanted = Object.entries(latest.current.chosen).flatMap(([role, id]) => {
      const place = places.find((one) => one.id === id);
      return place ? [{ role, place }] : [];
    });
    const answers = await Promise.all(
      wanted.map(async ({ role, place }) => ({ role, place, reading: await readPort(place.sourceId, place.port) })),
    );
    const read = await Promise.all(latest.current.registers.map(readPlace));
    bench.setInputs((before) => {
      const frames = { ...before.frames };
      for (const { role, reading } of answers) {
        if (!reading.ok) continue;
        for (const direction of ["in", "out"] as const) {
          const frame = reading[direction];
          if (frame) frames[toFrameId(role, direction)] = { text: frame.hex, isValid: frame.isValid };
        }
      }
      const samples = { ...before.samples };
      for (const one of read) if (one.ok) samples[one.id] = one.text;
      return { frames, samples };
    });
    const failures = [
      ...answers.flatMap(({ role, reading }) => (reading.ok ? [] : [`${role}: ${reading.message}`])),
      ...read.flatMap((one) => (one.ok ? [] : [one.message])),
    ];
    setState({ failures: [...new Set(failures)], at: new Date().toLocaleTimeString([], { hour12: false }) });
  }

  useEffect(() => {
    if (!isFollowing) return;
    let isOver = false;
    let timer: ReturnType<typeof setTimeout> | undefined;
    const turn = async () => {
      await readAll();
      if (!isOver) timer = setTimeout(() => void turn(), EVERY_MS);
    };
    void turn();
    return () => {
      isOver = true;
      clearTimeout(timer);
    };
    // Places and roles of the turn are read from the ref, so that a choice does not start another turn.
  }, [isFollowing]);

  if (places.length === 0)
    return <Empty title="No port to read from">Plan a master and its ports on the Sources page first.</Empty>;
  return (
    <div className="grid gap-3 border-b border-rule pb-3">
      <div className="grid grid-cols-2 gap-3">
        {machines.length > 0 ? (
          <Field label="As machine">
            {(tied) => (
              <Select
                {...tied}
                size="small"
                onChange={(event) => {
                  setMachine(event.currentTarget.value);
                  setChosen(chooseFor(places, roles, event.currentTarget.value));
                }}
              >
                {machines.map((machine) => (
                  <option key={machine} value={machine}>
                    {machine}
                  </option>
                ))}
              </Select>
            )}
          </Field>
        ) : null}
        {roles.map((role) => (
          <Field key={role} label={`${role} from`}>
            {(tied) => (
              <Select
                {...tied}
                size="small"
                value={chosen[role] ?? ""}
                onChange={(event) => setChosen({ ...chosen, [role]: event.currentTarget.value })}
              >
                <option value="">not read</option>
                {places.map((place) => (
                  <option key={place.id} value={place.id}>
                    {place.label}
                  </option>
                ))}
              </Select>
            )}
          </Field>
        ))}
      </div>
      <div className="flex flex-wrap items-center gap-2">
        <Button
          size="small"
          icon={RefreshCw}
          busy={isBusy}
          onClick={() => {
            setBusy(true);
            void readAll().finally(() => setBusy(false));
          }}
        >
          Read once
        </Button>
        <Button
          size="small"
          icon={isFollowing ? Pause : Play}
          aria-pressed={isFollowing}
          onClick={() => setFollowing(!isFollowing)}
        >
          {isFollowing ? "Stop" : "Follow every second"}
        </Button>
        {state && state.failures.length === 0 ? <StatusBadge status="good">read at {state.at}</StatusBadge> : null}
      </div>
      <Failures texts={state?.failures ?? []} />
      <p className="text-note text-ink-3">Reading from a live device. No values are written.</p>
    </div>
  );
}

function Failures({ texts }: { texts: readonly string[] }) {
  return texts.map((text) => (
    <p key={text} role="alert" className="flex items-start gap-1.5 text-small text-error">
      <span className="pt-0.5">
        <FindingShape severity="error" />
      </span>
      {text}
    </p>
  ));
}

type ReadPlace =
  { readonly ok: true; readonly id: string; readonly text: string } | { readonly ok: false; readonly message: string };

async function readPlace({ point, reference, sourceId, unitId, address, count }: RegisterPlace): Promise<ReadPlace> {
  const answer = await readRegisters(sourceId, { unitId, table: reference.table, address, count });
  if (!answer.ok) return { ok: false, message: `${reference.role}: ${answer.message}` };
  const value = readRegister(reference, answer.words, 0);
  return value === undefined
    ? { ok: false, message: `${point.label}: too few registers` }
    : { ok: true, id: point.id, text: String(value) };
}
