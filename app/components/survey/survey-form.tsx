import { Plus, X } from "lucide-react";
import { CommitInput, FigureInput } from "~/components/mapping/commit-input";
import { Choice } from "~/components/mapping/choice";
import { Button, IconButton } from "~/components/ui/button";
import { Field, Input, Select, TextArea } from "~/components/ui/field";
import { signalStates, type SurveySignal } from "~/domain/mapping/mapping-parts";
import { unitByCode } from "~/domain/units/units";
import type { DeviceSummary } from "~/services/read-devices.server";
import { dataTypeNames, deliveryWords, listGroups, stateHints, stateWords } from "./survey-words";

type Props = {
  signal: SurveySignal;
  signals: readonly SurveySignal[];
  devices: readonly DeviceSummary[];
  isBlocked: boolean;
  onChange: (next: SurveySignal) => void;
};

/** All that the survey knows of one signal. Every change is taken at once. */
export function SurveyForm({ signal, signals, devices, isBlocked, onChange }: Props) {
  const set = <K extends keyof SurveySignal>(key: K, value: SurveySignal[K] | undefined): void => {
    const { [key]: _old, ...rest } = signal;
    onChange((value === undefined ? rest : { ...rest, [key]: value }) as SurveySignal);
  };
  const take = (key: "name" | "group") => (text: string) => {
    if (key === "name" && text.trim() === "") return "it needs a name";
    set(key, text.trim());
    return undefined;
  };
  return (
    <div className="grid grid-cols-[1fr_1fr_1fr] gap-6 px-5 py-3">
      <fieldset disabled={isBlocked} className="grid min-w-0 content-start gap-2">
        <legend className="mb-1 text-small font-semibold">Signal</legend>
        <CommitInput label="Name" value={signal.name} onCommit={take("name")} />
        <Field label="Group">
          {(tied) => (
            <>
              <Input
                {...tied}
                size="small"
                list="survey-groups"
                value={signal.group}
                maxLength={200}
                onChange={(event) => set("group", event.currentTarget.value)}
              />
              <datalist id="survey-groups">
                {listGroups(signals).map((group) => (
                  <option key={group} value={group} />
                ))}
              </datalist>
            </>
          )}
        </Field>
        <CommitInput
          label="Wanted by, parted by commas"
          value={signal.wantedBy.join(", ")}
          onCommit={(text) => {
            set(
              "wantedBy",
              text
                .split(",")
                .map((one) => one.trim())
                .filter(Boolean),
            );
            return undefined;
          }}
        />
        <Choice
          label="State"
          value={signal.state}
          options={signalStates.map((state) => [state, `${stateWords[state]}: ${stateHints[state]}`] as const)}
          onChange={(state) => set("state", state)}
        />
      </fieldset>
      <fieldset disabled={isBlocked} className="grid min-w-0 content-start gap-2">
        <legend className="mb-1 text-small font-semibold">Source or sensor</legend>
        <div className="grid grid-cols-[1fr_2fr] gap-3">
          <Choice
            label="Today"
            value={signal.delivery.kind}
            options={Object.entries(deliveryWords) as [SurveySignal["delivery"]["kind"], string][]}
            onChange={(kind) => set("delivery", { ...signal.delivery, kind })}
          />
          <Field label="Device of the library">
            {(tied) => (
              <Select
                {...tied}
                size="small"
                value={signal.delivery.deviceDescriptionId ?? ""}
                onChange={(event) => {
                  const { deviceDescriptionId: _old, ...rest } = signal.delivery;
                  set(
                    "delivery",
                    event.currentTarget.value === ""
                      ? rest
                      : { ...rest, deviceDescriptionId: event.currentTarget.value },
                  );
                }}
              >
                <option value="">none</option>
                {devices.map((device) => (
                  <option key={device.id} value={device.id}>
                    {device.productIds[0] ?? device.deviceName}
                  </option>
                ))}
              </Select>
            )}
          </Field>
        </div>
        <CommitInput
          label="What delivers it"
          value={signal.delivery.text}
          onCommit={(text) => {
            set("delivery", { ...signal.delivery, text });
            return undefined;
          }}
        />
        <div className="grid grid-cols-2 gap-3">
          <Choice
            label="Data type"
            value={signal.dataType ?? ""}
            options={[["", "not said"] as const, ...dataTypeNames.map((name) => [name, name] as const)]}
            onChange={(name) => set("dataType", name === "" ? undefined : name)}
          />
          <CommitInput
            label="Unit, UN/CEFACT code"
            mono
            value={signal.unit ?? ""}
            hint={signal.unit === undefined ? undefined : unitByCode(signal.unit)?.name}
            onCommit={(text) => {
              const code = text.trim().toUpperCase();
              if (code !== "" && !unitByCode(code)) return `Rec. 20 has no code ${code}`;
              set("unit", code === "" ? undefined : code);
              return undefined;
            }}
          />
          <FigureInput
            label="Range from"
            value={signal.range?.low}
            onClear={() => set("range", undefined)}
            onCommit={(low) => set("range", { low, high: Math.max(low, signal.range?.high ?? low) })}
          />
          <FigureInput
            label="Range to"
            value={signal.range?.high}
            onClear={() => set("range", undefined)}
            onCommit={(high) => set("range", { low: Math.min(high, signal.range?.low ?? high), high })}
          />
        </div>
      </fieldset>
      <fieldset disabled={isBlocked} className="grid min-w-0 content-start gap-2">
        <legend className="mb-1 text-small font-semibold">Evidence</legend>
        <ul className="grid gap-1.5">
          {signal.evidence.map((evidence, index) => {
            const change = (next: (typeof signal.evidence)[number]) =>
              set(
                "evidence",
                signal.evidence.map((old, i) => (i === index ? next : old)),
              );
            return (
              <li key={index} className="grid grid-cols-[84px_1fr_1fr_24px] items-end gap-2">
                <Choice
                  label="Kind"
                  value={evidence.kind}
                  options={[
                    ["photo", "photo"],
                    ["page", "page"],
                    ["note", "note"],
                  ]}
                  onChange={(kind) => change({ ...evidence, kind })}
                />
                <CommitInput
                  label="What it shows"
                  value={evidence.text}
                  onCommit={(text) => (change({ ...evidence, text }), undefined)}
                />
                <CommitInput
                  label="Address"
                  value={evidence.url ?? ""}
                  onCommit={(text) => {
                    const { url: _old, ...rest } = evidence;
                    change(text.trim() === "" ? rest : { ...rest, url: text.trim() });
                    return undefined;
                  }}
                />
                <IconButton
                  icon={X}
                  size="small"
                  label={`Remove evidence ${index + 1}`}
                  onClick={() =>
                    set(
                      "evidence",
                      signal.evidence.filter((_, i) => i !== index),
                    )
                  }
                />
              </li>
            );
          })}
        </ul>
        <Button
          size="small"
          icon={Plus}
          className="justify-self-start"
          onClick={() => set("evidence", [...signal.evidence, { kind: "note", text: "" }])}
        >
          Evidence
        </Button>
        <Field label="Note">
          {(tied) => (
            <TextArea
              key={signal.note ?? ""}
              {...tied}
              rows={3}
              maxLength={2_000}
              defaultValue={signal.note ?? ""}
              onBlur={(event) => {
                const text = event.currentTarget.value.trim();
                if (text !== (signal.note ?? "")) set("note", text === "" ? undefined : text);
              }}
            />
          )}
        </Field>
      </fieldset>
    </div>
  );
}
