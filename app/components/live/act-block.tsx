import { TriangleAlert } from "lucide-react";
import { useEffect, useState, type ReactNode } from "react";
import { chooseDecimals, formatNumber, formatRange } from "~/domain/live/format-live";
import type { CallAnswer, MethodArgument, WriteAnswer } from "~/domain/live/live-action";
import type { NodeCard } from "~/domain/live/live-node";
import type { LiveTarget } from "~/domain/live/live-target";
import { Field, Input, Select } from "../ui/field";
import { Icon } from "../ui/icon";
import { HoldButton } from "./hold-button";
import { useLiveValue } from "./live-context";

type Props = {
  target: LiveTarget;
  card: NodeCard | null;
  /** The object that a Method is called on. */
  owner: string;
  mayWrite: boolean;
};

/** Writing a value or calling a Method: fenced, with its consequence, behind a held press, and in the audit. */
export function ActBlock({ target, card, owner, mayWrite }: Props) {
  if (!card || !target.isOpen) return null;
  const blockedBy = !mayWrite
    ? `Your roles do not write or call on ${target.kind === "test-server" ? "test servers" : "endpoints"}`
    : target.isProtected
      ? undefined
      : "Nothing is written or called over an unprotected connection";
  if (card.nodeClass === "Method") return <CallBlock key={card.nodeId} target={target} card={card} owner={owner} blockedBy={blockedBy} />;
  const isWritable = card.nodeClass === "Variable" && card.accessLevel.includes("CurrentWrite") && (card.valueRank ?? -1) < 0;
  return isWritable ? <WriteBlock key={card.nodeId} target={target} card={card} blockedBy={blockedBy} /> : null;
}

function Fence({ title, about, foot, children }: { title: string; about: string; foot: ReactNode; children: ReactNode }) {
  return (
    <section aria-label={title} className="mt-3 border-[1.5px] border-warning bg-warning-wash px-3 pt-2">
      <h3 className="flex items-center gap-1.5 text-body font-semibold text-warning">
        <Icon of={TriangleAlert} size={15} /> {title}
      </h3>
      <p className="mb-2 text-small text-ink-2">{about}</p>
      {children}
      <p className="mt-2 flex min-h-7.5 flex-wrap items-center justify-between gap-x-3 border-t border-rule text-small text-ink-2">{foot}</p>
    </section>
  );
}

const MACHINE_CAUTION =
  "This acts on a running machine: it may start, stop or move. It is no safety function. Check range, unit and owner, see that nobody is within reach, and follow the machine's risk assessment, local codes and licensed practice.";

/** Acting on anything but a test server of ours asks for the endpoint's name, so that nobody acts on the wrong one. */
function ConfirmField({ target, value, onChange }: { target: LiveTarget; value: string; onChange: (text: string) => void }) {
  if (target.kind === "test-server") return null;
  return (
    <div className="w-64">
      <Field label={`Type “${target.name}” to confirm`} hint={target.endpointUrl ?? ""}>
        {(control) => <Input {...control} value={value} onChange={(event) => onChange(event.target.value)} autoComplete="off" />}
      </Field>
    </div>
  );
}

function isUnconfirmed(target: LiveTarget, confirm: string): boolean {
  return target.kind === "endpoint" && confirm.trim() !== target.name;
}

const AUDIT = <span className="text-note text-ink-3">written to the audit</span>;

function WriteBlock({ target, card, blockedBy }: { target: LiveTarget; card: NodeCard; blockedBy: string | undefined }) {
  const value = useLiveValue(card.nodeId);
  const [text, setText] = useState("");
  const [confirm, setConfirm] = useState("");
  const { ask, isBusy, answer, problem } = useAct<WriteAnswer>(`/live/${target.id}/write`);
  const unit = card.unit?.text ?? "";
  const now = value?.sample.value;
  const step = typeof now === "number" && text.trim() !== "" ? Number(text.replace(",", ".").replace("\u2212", "-")) - now : Number.NaN;
  const decimals = typeof now === "number" ? chooseDecimals(now, card.range) : 0;
  return (
    <Fence
      title={`Writing sets ${card.displayName}`}
      about={
        target.kind === "test-server"
          ? "On this test server only; no machine is connected. A value that moves by itself stays as written, marked as forced by hand, until the server stops."
          : MACHINE_CAUTION
      }
      foot={
        <>
          <Outcome problem={problem} text={answer ? `${answer.status}: ${answer.before.text} → ${answer.after.text}` : null} isDone={answer?.isDone ?? true} />
          {AUDIT}
        </>
      }
    >
      <div className="flex flex-wrap items-end gap-3">
        <div className="w-40">
          <TypedField label="New value" type={card.builtInType ?? ""} states={card.states} unit={unit} value={text} onChange={setText} />
        </div>
        <p className="font-mono text-note leading-4 text-ink-3">
          now {value?.sample.text ?? "…"}
          {Number.isFinite(step) ? `, step ${step >= 0 ? "+" : ""}${formatNumber(step, decimals)}` : ""}
          <br />
          {card.range ? `allowed ${formatRange(card.range)}` : "no range given"}
        </p>
        <ConfirmField target={target} value={confirm} onChange={setConfirm} />
        <span className="ml-auto">
          <HoldButton
            busy={isBusy}
            blockedBy={blockedBy ?? (text === "" ? "Give the new value first" : isUnconfirmed(target, confirm) ? "Confirm the endpoint first" : undefined)}
            onHeld={() => void ask({ node: card.nodeId, value: text, confirm: confirm.trim() })}
          >
            Hold to write
          </HoldButton>
        </span>
      </div>
    </Fence>
  );
}

type CallProps = { target: LiveTarget; card: NodeCard; owner: string; blockedBy: string | undefined };

function CallBlock({ target, card, owner, blockedBy }: CallProps) {
  const [inputs, setInputs] = useState<readonly string[]>(() => card.inputArguments.map(() => ""));
  const [confirm, setConfirm] = useState("");
  const { ask, isBusy, answer, problem } = useAct<CallAnswer>(`/live/${target.id}/call`);
  const isOpen = card.inputArguments.some((argument, index) => inputs[index] === "" && argument.builtInType !== "String");
  const hasArray = card.inputArguments.some((argument) => argument.builtInType === "array");
  const outputs = answer?.outputs.map((output) => `${output.name} = ${output.text}`).join(", ");
  return (
    <Fence
      title={`Calling runs ${card.displayName}`}
      about={target.kind === "test-server" ? "On this test server only; no machine is connected. It answers with typed results and does nothing else." : MACHINE_CAUTION}
      foot={
        <>
          <Outcome problem={problem} text={answer ? `${answer.status}${outputs ? `: ${outputs}` : ""}` : null} isDone={answer?.isDone ?? true} />
          {AUDIT}
        </>
      }
    >
      <div className="flex flex-wrap items-end gap-3">
        {card.inputArguments.map((argument, index) => (
          <div key={argument.name} className="w-40">
            <TypedField
              label={`${argument.name}, ${argument.builtInType}`}
              type={argument.builtInType}
              states={[]}
              unit=""
              value={inputs[index] ?? ""}
              onChange={(text) => setInputs(inputs.map((old, at) => (at === index ? text : old)))}
            />
          </div>
        ))}
        {card.inputArguments.length === 0 ? <p className="text-small text-ink-2">It takes no arguments.</p> : null}
        <ConfirmField target={target} value={confirm} onChange={setConfirm} />
        <span className="ml-auto">
          <HoldButton
            busy={isBusy}
            blockedBy={blockedBy ?? (hasArray ? "Arrays are not given from here" : isOpen ? "Give all arguments first" : isUnconfirmed(target, confirm) ? "Confirm the endpoint first" : undefined)}
            onHeld={() => void ask({ object: owner, method: card.nodeId, inputs, confirm: confirm.trim() })}
          >
            Hold to call
          </HoldButton>
        </span>
      </div>
    </Fence>
  );
}

type FieldProps = { label: string; type: MethodArgument["builtInType"]; states: NodeCard["states"]; unit: string; value: string; onChange: (text: string) => void };

/** A choice for truth values and states, else a field that the server's type judges. */
function TypedField({ label, type, states, unit, value, onChange }: FieldProps) {
  const options = type === "Boolean" ? [{ value: "true", text: "true" }, { value: "false", text: "false" }] : states.map((state) => ({ value: String(state.value), text: `${state.value} ${state.text}` }));
  return (
    <Field label={label}>
      {(control) =>
        options.length > 0 ? (
          <Select {...control} value={value} onChange={(event) => onChange(event.target.value)}>
            <option value="">choose</option>
            {options.map((option) => (
              <option key={option.value} value={option.value}>
                {option.text}
              </option>
            ))}
          </Select>
        ) : (
          <Input {...control} mono unit={unit === "" ? undefined : unit} value={value} onChange={(event) => onChange(event.target.value)} autoComplete="off" />
        )
      }
    </Field>
  );
}

function Outcome({ problem, text, isDone }: { problem: string | null; text: string | null; isDone: boolean }) {
  return (
    <span role="status" className={problem !== null || !isDone ? "text-error" : "font-mono"}>
      {problem ?? text ?? "Nothing has been done yet."}
    </span>
  );
}

type Act<Answer> = { ask: (body: object) => Promise<void>; isBusy: boolean; answer: Answer | null; problem: string | null };

function useAct<Answer>(address: string): Act<Answer> {
  const [state, setState] = useState<{ isBusy: boolean; answer: Answer | null; problem: string | null }>({ isBusy: false, answer: null, problem: null });
  useEffect(() => setState({ isBusy: false, answer: null, problem: null }), [address]);
  const ask = async (body: object): Promise<void> => {
    setState({ isBusy: true, answer: null, problem: null });
    try {
      const answer = await fetch(address, { method: "POST", headers: { "content-type": "application/json" }, body: JSON.stringify(body) });
      const json: unknown = await answer.json();
      setState(answer.ok ? { isBusy: false, answer: json as Answer, problem: null } : { isBusy: false, answer: null, problem: (json as { detail?: string }).detail ?? "It was refused." });
    } catch {
      setState({ isBusy: false, answer: null, problem: "Ferrule does not answer; whether it was done is not known." });
    }
  };
  return { ...state, ask };
}
