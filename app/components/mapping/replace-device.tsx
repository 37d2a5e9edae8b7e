import { ArrowRightLeft } from "lucide-react";
import { useState } from "react";
import { useParams, useRevalidator } from "react-router";
import { FindingShape } from "~/components/notation/finding-badge";
import { Button } from "~/components/ui/button";
import { Field, Input, Select } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { RowHead, Table, TableScroll, Td, Th } from "~/components/ui/table";
import { showToast } from "~/components/ui/toast";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { BoundRole } from "~/domain/mapping/bindings";
import type { Replacement } from "~/domain/mapping/replace-device";
import type { DeviceSummary } from "~/services/read-devices.server";

type Props = {
  machine: NodeKey;
  role: string;
  bound: BoundRole;
  devices: readonly DeviceSummary[];
  blockedBy: string | undefined;
};

const kindWords = {
  same: [
    "good",
    "The same device: the model does not change. Serial numbers are logged and its point checks are due again.",
  ],
  compatible: [
    "hint",
    "A compatible device: every field that is read lies where it lay. The role gets the new ids; point checks are due again.",
  ],
  other: [
    "warning",
    "Another device: look at the list below before it is bought. Rows are mapped anew where a field for them was found.",
  ],
} as const;

/** Guided: choose the new device, see what it means, then write its serial number. */
export function ReplaceDevice({ machine, role, bound, devices, blockedBy }: Props) {
  const { modelId = "" } = useParams();
  const { revalidate } = useRevalidator();
  const same =
    devices.find((device) => device.id === bound.value.deviceDescriptionId) ??
    devices.find((device) => device.deviceId === bound.value.deviceId && device.vendorId === bound.value.vendorId);
  const [deviceId, setDeviceId] = useState(same?.id ?? devices[0]?.id ?? "");
  const [serialNumber, setSerialNumber] = useState("");
  const [reason, setReason] = useState("");
  const [impact, setImpact] = useState<Replacement | undefined>(undefined);
  const [isBusy, setBusy] = useState(false);

  async function ask(act: "preview" | "replace"): Promise<void> {
    setBusy(true);
    const body = {
      act,
      machine,
      role,
      deviceDescriptionId: deviceId,
      ...(act === "replace" ? { serialNumber, reason } : {}),
    };
    const answer = await post(`/models/${modelId}/device-replacement`, body);
    setBusy(false);
    if (!answer.ok) {
      showToast({ tone: "error", title: "The device cannot be replaced", detail: answer.message, seconds: 12 });
    } else if (act === "preview") {
      setImpact(answer.value as Replacement);
    } else {
      setImpact(undefined);
      setSerialNumber("");
      setReason("");
      showToast({
        tone: "good",
        title: "The replacement is logged",
        detail: "Point checks of the nodes that it feeds are due again.",
      });
      await revalidate();
    }
  }

  return (
    <div className="grid gap-3">
      <p className="text-small">
        {bound.value.productName ?? "a device"}{" "}
        <span className="font-mono text-note text-ink-3">
          {bound.value.vendorId} / {bound.value.deviceId}
        </span>
        , serial number <span className="font-mono">{bound.binding?.serialNumber ?? "not known"}</span>
      </p>
      <div className="grid grid-cols-[2fr_auto] items-end gap-3">
        <Field label="Replace it by">
          {(tied) => (
            <Select
              {...tied}
              size="small"
              value={deviceId}
              onChange={(event) => {
                setDeviceId(event.currentTarget.value);
                setImpact(undefined);
              }}
            >
              {devices.map((device) => (
                <option key={device.id} value={device.id}>
                  {device.productIds[0] ?? device.deviceName}, {device.deviceName}, {device.documentVersion}
                </option>
              ))}
            </Select>
          )}
        </Field>
        <Button
          size="small"
          busy={isBusy}
          blockedBy={blockedBy ?? (deviceId === "" ? "the library is empty" : undefined)}
          onClick={() => void ask("preview")}
        >
          What would change
        </Button>
      </div>
      {impact ? (
        <>
          <Impact impact={impact} />
          <div className="grid grid-cols-[1fr_2fr_auto] items-end gap-3">
            <Field label="New serial number">
              {(tied) => (
                <Input
                  {...tied}
                  size="small"
                  mono
                  maxLength={200}
                  value={serialNumber}
                  onChange={(event) => setSerialNumber(event.currentTarget.value)}
                />
              )}
            </Field>
            <Field label="Reason">
              {(tied) => (
                <Input
                  {...tied}
                  size="small"
                  maxLength={2_000}
                  value={reason}
                  onChange={(event) => setReason(event.currentTarget.value)}
                />
              )}
            </Field>
            <Button
              size="small"
              tone="main"
              icon={ArrowRightLeft}
              busy={isBusy}
              blockedBy={blockedBy ?? (serialNumber.trim() === "" ? "the new serial number is needed" : undefined)}
              onClick={() => void ask("replace")}
            >
              Replace
            </Button>
          </div>
        </>
      ) : null}
    </div>
  );
}

const effectWords = { keeps: "stays", changes: "changes", loses: "is lost" } as const;

function Impact({ impact }: { impact: Replacement }) {
  const [tone, text] = kindWords[impact.kind];
  const changed = impact.fields.filter((field) => field.change !== "same");
  return (
    <div className="grid gap-2">
      <p className="flex items-start gap-1.5 text-small">
        <span className="pt-0.5">
          {tone === "good" ? <Icon of={ArrowRightLeft} className="text-good" /> : <FindingShape severity={tone} />}
        </span>
        {text}
      </p>
      {changed.length > 0 ? (
        <TableScroll label="Fields that differ">
          <Table caption="Fields that differ">
            <thead>
              <tr>
                <Th>Field</Th>
                <Th>Before</Th>
                <Th>After</Th>
              </tr>
            </thead>
            <tbody>
              {changed.map((field) => (
                <tr key={`${field.direction} ${field.subindex}`}>
                  <RowHead>{field.text}</RowHead>
                  <Td mono>{field.before}</Td>
                  <Td mono>{field.after}</Td>
                </tr>
              ))}
            </tbody>
          </Table>
        </TableScroll>
      ) : null}
      <TableScroll label="Nodes that it feeds">
        <Table caption="Nodes that it feeds">
          <thead>
            <tr>
              <Th>Node</Th>
              <Th>Effect</Th>
              <Th>What happens</Th>
            </tr>
          </thead>
          <tbody>
            {impact.rows.map((row) => (
              <tr key={row.path}>
                <RowHead>{row.path}</RowHead>
                <Td
                  className={
                    row.effect === "loses" ? "text-error" : row.effect === "changes" ? "text-warning" : "text-ink-2"
                  }
                >
                  {effectWords[row.effect]}
                </Td>
                <Td className="text-ink-2">{row.text}</Td>
              </tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
    </div>
  );
}

async function post(
  url: string,
  body: unknown,
): Promise<{ ok: true; value: unknown } | { ok: false; message: string }> {
  try {
    const response = await fetch(url, {
      method: "POST",
      headers: { "content-type": "application/json" },
      body: JSON.stringify(body),
    });
    const value = (await response.json()) as { detail?: string };
    return response.ok ? { ok: true, value } : { ok: false, message: value.detail ?? `status ${response.status}` };
  } catch (error) {
    return { ok: false, message: error instanceof Error ? error.message : String(error) };
  }
}
