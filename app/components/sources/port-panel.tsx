import { useEffect, useState, type FormEvent } from "react";
import { FindingShape } from "~/components/notation/finding-badge";
import { Button, TextLink } from "~/components/ui/button";
import { Field, Input, Select } from "~/components/ui/field";
import { href } from "react-router";
import { portModes, type PortPlan } from "~/domain/mapping/source-settings";
import type { DeviceSummary } from "~/services/read-devices.server";
import type { PortView, SourceView } from "~/services/read-sources.server";
import type { SourceFinding } from "~/services/list-source-findings.server";
import { LiveReading } from "./live-reading";
import { modeWords } from "./source-words";
import type { SourceActions } from "./use-source-actions";

type Props = {
  source: SourceView;
  port: PortView;
  devices: readonly DeviceSummary[];
  findings: readonly SourceFinding[];
  actions: SourceActions;
};

/** Facts, plan and present reading of one port. */
export function PortPanel({ source, port, devices, findings, actions }: Props) {
  return (
    <div className="grid h-full grid-cols-[minmax(240px,1fr)_minmax(420px,1.6fr)_minmax(320px,1.4fr)] divide-x divide-rule">
      <section aria-label="Facts" className="px-5 py-2.5">
        <h3 className="mb-1.5 text-note font-semibold text-ink-3">Facts</h3>
        {findings.map((finding) => (
          <p key={`${finding.rule} ${finding.message}`} className="mb-1 flex items-start gap-1.5 text-small">
            <span className="pt-0.5">
              <FindingShape severity={finding.severity} />
            </span>
            <span>
              <span className="font-mono text-note text-ink-3">{finding.rule}</span> {finding.message}
            </span>
          </p>
        ))}
        {port.bindings.length === 0 ? (
          <p className="text-small text-ink-2">
            No machine reads this port yet. Machines are bound to ports on the Mapping page of a model of machines.
          </p>
        ) : (
          <ul className="text-small">
            {port.bindings.map((binding) => (
              <li key={`${binding.machineKey} ${binding.role}`} className="border-b border-hair py-1">
                <TextLink to={href("/models/:modelId/mapping", { modelId: binding.modelId })}>
                  <strong className="font-semibold">{binding.machine}</strong> {binding.role}
                </TextLink>
                <span className="block text-note text-ink-3">
                  wants {binding.productName ?? "no certain device"}
                  {binding.vendorId === undefined ? "" : `, ${binding.vendorId} / ${binding.deviceId}`}
                  {binding.binding.serialNumber ? `, serial ${binding.binding.serialNumber}` : ""}
                </span>
              </li>
            ))}
          </ul>
        )}
      </section>
      <section aria-label="Plan" className="px-5 py-2.5">
        <h3 className="mb-1.5 text-note font-semibold text-ink-3">Plan</h3>
        <PlanForm key={`${source.id} ${port.port}`} source={source} port={port} devices={devices} actions={actions} />
      </section>
      <section aria-label="Present reading" className="min-w-0 px-5 py-2.5">
        <h3 className="mb-1.5 text-note font-semibold text-ink-3">Present reading</h3>
        <LiveReading key={`${source.id} ${port.port}`} source={source} port={port} />
      </section>
    </div>
  );
}

function PlanForm({ source, port, devices, actions }: Omit<Props, "findings">) {
  const [plan, setPlan] = useState<PortPlan>(port.plan ?? { portClass: "A", mode: "IOL_AUTOSTART" });
  const [cycle, setCycle] = useState(port.plan?.cycleMs === undefined ? "" : String(port.plan.cycleMs));
  const signature = JSON.stringify(port.plan);
  useEffect(() => {
    if (port.plan) setPlan(port.plan);
    // The signature says when the plan that the server keeps became another one.
  }, [signature]);
  const set = <K extends keyof PortPlan>(key: K, value: PortPlan[K] | undefined): void => {
    const { [key]: _old, ...rest } = plan;
    setPlan((value === undefined || value === "" ? rest : { ...rest, [key]: value }) as PortPlan);
  };
  function chooseDevice(id: string): void {
    const device = devices.find((one) => one.id === id);
    const { deviceDescriptionId: _id, vendorId: _vendor, deviceId: _device, ...rest } = plan;
    setPlan(device ? { ...rest, deviceDescriptionId: id, vendorId: device.vendorId, deviceId: device.deviceId } : rest);
  }
  async function submit(event: FormEvent): Promise<void> {
    event.preventDefault();
    const { cycleMs: _cycle, ...rest } = plan;
    const cycleMs = Number(cycle.replace(",", "."));
    await actions.send({
      intent: "save-port",
      value: { sourceId: source.id, port: port.port, plan: cycle.trim() === "" ? rest : { ...rest, cycleMs } },
    });
  }
  const isCycleWrong = cycle.trim() !== "" && !(Number(cycle.replace(",", ".")) > 0);
  return (
    <form onSubmit={(event) => void submit(event)} className="grid grid-cols-3 items-start gap-x-3 gap-y-2">
      <Field label="Device" className="col-span-2">
        {(tied) => (
          <Select
            {...tied}
            size="small"
            value={plan.deviceDescriptionId ?? ""}
            onChange={(event) => chooseDevice(event.currentTarget.value)}
          >
            <option value="">none planned</option>
            {devices.map((device) => (
              <option key={device.id} value={device.id}>
                {device.productIds[0] ?? device.deviceName}, {device.deviceName}, {device.documentVersion}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Field label="Mode">
        {(tied) => (
          <Select
            {...tied}
            size="small"
            value={plan.mode}
            onChange={(event) => set("mode", event.currentTarget.value as PortPlan["mode"])}
          >
            {portModes.map((mode) => (
              <option key={mode} value={mode}>
                {modeWords[mode]}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Field label="Port class">
        {(tied) => (
          <Select
            {...tied}
            size="small"
            value={plan.portClass}
            onChange={(event) => set("portClass", event.currentTarget.value as "A" | "B")}
          >
            <option value="A">A, pins 2 and 5 free</option>
            <option value="B">B, second supply</option>
          </Select>
        )}
      </Field>
      <Field
        label="Cycle"
        hint="Empty: as fast as the device allows."
        errors={isCycleWrong ? ["a time above 0"] : undefined}
      >
        {(tied) => (
          <Input
            {...tied}
            size="small"
            mono
            unit="ms"
            inputMode="decimal"
            value={cycle}
            onChange={(event) => setCycle(event.currentTarget.value)}
          />
        )}
      </Field>
      <Field label="Alias in the master" hint={`Empty: master1port${port.port}`}>
        {(tied) => (
          <Input
            {...tied}
            size="small"
            mono
            maxLength={200}
            value={plan.deviceAlias ?? ""}
            onChange={(event) => set("deviceAlias", event.currentTarget.value)}
          />
        )}
      </Field>
      <Field label="Serial number">
        {(tied) => (
          <Input
            {...tied}
            size="small"
            mono
            maxLength={200}
            value={plan.serialNumber ?? ""}
            onChange={(event) => set("serialNumber", event.currentTarget.value)}
          />
        )}
      </Field>
      <Field label="Note" className="col-span-2">
        {(tied) => (
          <Input
            {...tied}
            size="small"
            maxLength={2_000}
            value={plan.note ?? ""}
            onChange={(event) => set("note", event.currentTarget.value)}
          />
        )}
      </Field>
      <div className="col-span-3 flex gap-2">
        <Button
          type="submit"
          tone="main"
          size="small"
          busy={actions.isBusy}
          blockedBy={actions.blockedBy ?? (isCycleWrong ? "the cycle is no time" : undefined)}
        >
          Plan port {port.port}
        </Button>
        {port.plan ? (
          <Button
            size="small"
            blockedBy={actions.blockedBy}
            onClick={() => void actions.send({ intent: "save-port", value: { sourceId: source.id, port: port.port } })}
          >
            Empty the port
          </Button>
        ) : null}
      </div>
    </form>
  );
}
