import { FileUp } from "lucide-react";
import { useRef, useState, type DragEvent } from "react";
import { href, useRevalidator } from "react-router";
import { FindingShape } from "~/components/notation/finding-badge";
import { ProblemList, type ShownProblem } from "~/components/models/problem-list";
import { TextLink } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Icon } from "~/components/ui/icon";
import { Notice } from "~/components/ui/notice";
import { Progress } from "~/components/ui/progress";

type Outcome = {
  readonly file: string;
  readonly devices: readonly { readonly id: string; readonly deviceName: string; readonly documentVersion: string }[];
  readonly problems: readonly ShownProblem[];
  /** Why no answer came. */
  readonly failure?: string;
};

/** Device files are dropped here, several at a time; each is taken whole or not at all, and says what was wrong where. */
export function DeviceUpload({ blockedBy, isFirst }: { blockedBy: string | undefined; isFirst: boolean }) {
  const { revalidate } = useRevalidator();
  const input = useRef<HTMLInputElement>(null);
  const stop = useRef<AbortController | null>(null);
  const [over, setOver] = useState(false);
  const [running, setRunning] = useState<{ name: string; index: number; count: number } | undefined>(undefined);
  const [outcomes, setOutcomes] = useState<readonly Outcome[]>([]);

  async function send(files: readonly File[]): Promise<void> {
    const controller = new AbortController();
    stop.current = controller;
    setOutcomes([]);
    for (const [index, file] of files.entries()) {
      if (controller.signal.aborted) break;
      setRunning({ name: file.name, index: index + 1, count: files.length });
      const outcome = await sendFile(file, controller.signal);
      if (outcome) setOutcomes((before) => [...before, outcome]);
    }
    setRunning(undefined);
    if (input.current) input.current.value = "";
    await revalidate();
  }
  function take(files: FileList | null): void {
    if (files && files.length > 0 && blockedBy === undefined) void send([...files]);
  }
  function onDrop(event: DragEvent): void {
    event.preventDefault();
    setOver(false);
    take(event.dataTransfer.files);
  }

  return (
    <div className="mb-4 grid gap-3">
      {blockedBy === undefined ? (
        <label
          onDragOver={(event) => (event.preventDefault(), setOver(true))}
          onDragLeave={() => setOver(false)}
          onDrop={onDrop}
          className={cx(
            "flex cursor-pointer items-center justify-center gap-3 border border-dashed px-5 text-center has-focus-visible:outline-2 has-focus-visible:outline-copper",
            isFirst ? "flex-col py-10" : "py-3",
            over ? "border-copper bg-copper-wash" : "border-edge hover:bg-bench",
          )}
        >
          <Icon of={FileUp} size={isFirst ? 28 : 18} className="text-ink-3" />
          <span className="text-body font-semibold">Drop IODD files here, or press to choose them</span>
          <span className="text-small text-ink-2">ZIP package or single XML, IODD 1.0.1 or 1.1, up to 50 MB each</span>
          <input
            ref={input}
            type="file"
            multiple
            accept=".zip,.xml,application/zip,application/xml,text/xml"
            className="sr-only"
            onChange={(event) => take(event.currentTarget.files)}
          />
        </label>
      ) : (
        <p className="text-small text-ink-2">Adding a device description {blockedBy}.</p>
      )}
      {running ? (
        <Progress
          stage={`Sending and reading ${running.name}`}
          figure={`${running.index} of ${running.count}`}
          onCancel={() => stop.current?.abort()}
        />
      ) : null}
      <CleanFiles outcomes={outcomes.filter(isClean)} />
      {outcomes
        .filter((outcome) => !isClean(outcome))
        .map((outcome, i) => (
          <OutcomeNotice key={`${outcome.file} ${i}`} outcome={outcome} />
        ))}
    </div>
  );
}

function isClean({ devices, problems }: Outcome): boolean {
  return devices.length > 0 && problems.length === 0;
}

/** What was read without a word to say needs one line together. */
function CleanFiles({ outcomes }: { outcomes: readonly Outcome[] }) {
  const devices = outcomes.flatMap((outcome) => outcome.devices);
  if (devices.length === 0) return null;
  return (
    <Notice tone="good" live title={`${devices.length} ${devices.length === 1 ? "description" : "descriptions"} read`}>
      <DeviceLinks devices={devices} />
    </Notice>
  );
}

function DeviceLinks({ devices }: { devices: Outcome["devices"] }) {
  return devices.map((device, i) => (
    <span key={device.id}>
      {i > 0 ? ", " : ""}
      <TextLink to={href("/devices/:deviceId", { deviceId: device.id })}>
        {device.deviceName} {device.documentVersion}
      </TextLink>
    </span>
  ));
}

function OutcomeNotice({ outcome }: { outcome: Outcome }) {
  const isTaken = outcome.devices.length > 0;
  return (
    <section aria-label={outcome.file}>
      <Notice
        live
        tone={isTaken ? (outcome.problems.length > 0 ? "warning" : "good") : "error"}
        glyph={isTaken ? undefined : <FindingShape severity="error" />}
        title={
          isTaken ? (
            <>
              {outcome.file}: <DeviceLinks devices={outcome.devices} /> read
            </>
          ) : (
            `${outcome.file} cannot be taken in`
          )
        }
      >
        {isTaken
          ? outcome.problems.length > 0
            ? "It is in the library; these places deserve a look."
            : null
          : (outcome.failure ?? "Nothing was stored.")}
      </Notice>
      {outcome.problems.length > 0 ? (
        <ProblemList problems={outcome.problems} caption={`Problems of ${outcome.file}`} />
      ) : null}
    </section>
  );
}

/** Undefined when it was cancelled. */
async function sendFile(file: File, signal: AbortSignal): Promise<Outcome | undefined> {
  try {
    const response = await fetch(`/devices/files?name=${encodeURIComponent(file.name)}`, {
      method: "POST",
      headers: { "content-type": "application/octet-stream" },
      body: file,
      signal,
    });
    const answer = (await response.json()) as { devices?: Outcome["devices"]; problems?: Outcome["problems"] };
    return { file: file.name, devices: answer.devices ?? [], problems: answer.problems ?? [] };
  } catch (error) {
    if (signal.aborted) return undefined;
    const message = error instanceof Error ? error.message : String(error);
    return { file: file.name, devices: [], problems: [], failure: `The server did not answer: ${message}` };
  }
}
