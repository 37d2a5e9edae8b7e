import { useMemo, useState } from "react";
import { RefreshCw } from "lucide-react";
import { viewFrame } from "~/components/frames/frame-fields";
import { FrameTable } from "~/components/frames/frame-table";
import { readFields } from "~/components/frames/read-fields";
import { FindingShape } from "~/components/notation/finding-badge";
import { StatusBadge } from "~/components/notation/status-badge";
import { Button } from "~/components/ui/button";
import type { DeviceDescription } from "~/domain/iodd/device-description";
import { formatHex, parseHex } from "~/domain/mapping/bits";
import { chooseLayout } from "~/domain/mapping/choose-layout";
import type { PortView, SourceView } from "~/services/read-sources.server";
import { readPort, type ReadFrame as Frame, type PortReading } from "./read-port";

/** One reading on demand, with the fields of the planned device. Nothing is written. */
export function LiveReading({ source, port }: { source: SourceView; port: PortView }) {
  const [reading, setReading] = useState<PortReading | undefined>(undefined);
  const [device, setDevice] = useState<DeviceDescription | undefined>(undefined);
  const [isBusy, setBusy] = useState(false);
  async function read(): Promise<void> {
    setBusy(true);
    const [next, description] = await Promise.all([readPort(source.id, port.port), loadDescription(port.device?.id)]);
    setReading(next);
    setDevice(description);
    setBusy(false);
  }
  return (
    <div className="grid gap-2">
      <div className="flex items-center gap-3">
        <Button size="small" icon={RefreshCw} busy={isBusy} onClick={() => void read()}>
          Read the port now
        </Button>
        <span className="text-note text-ink-3">Reading from a live device. No values are written.</span>
      </div>
      {reading === undefined ? null : reading.ok ? (
        (["in", "out"] as const).map((direction) => {
          const frame = reading[direction];
          return frame ? <ReadFrame key={direction} direction={direction} frame={frame} device={device} /> : null;
        })
      ) : (
        <p role="alert" className="flex items-start gap-1.5 text-small text-error">
          <span className="pt-0.5">
            <FindingShape severity="error" />
          </span>
          {reading.message}
        </p>
      )}
      {reading?.ok && !reading.in && !reading.out ? (
        <p className="text-small text-ink-2">The port answers, but no process data.</p>
      ) : null}
    </div>
  );
}

function ReadFrame({
  direction,
  frame,
  device,
}: {
  direction: "in" | "out";
  frame: Frame;
  device: DeviceDescription | undefined;
}) {
  const octets = useMemo(() => parseHex(frame.hex) ?? new Uint8Array(), [frame]);
  const layout = device ? chooseLayout(device, direction) : undefined;
  const view = layout?.ok
    ? viewFrame(layout.value, { profileCharacteristic: device?.profileCharacteristic ?? [] })
    : undefined;
  const read = view && readFields(view, octets);
  return (
    <div className="grid gap-1">
      <p className="flex items-center gap-2 text-small">
        Process data {direction} <code>{formatHex(octets)}</code>
        <StatusBadge status={frame.isValid ? "good" : "bad"}>{frame.isValid ? "valid" : "not valid"}</StatusBadge>
      </p>
      {view && read?.ok ? (
        <FrameTable label={`Process data ${direction}`} view={view} readings={read.readings} isCompact />
      ) : null}
      {read && !read.ok ? (
        <p className="text-small text-error">
          {octets.length} octets; the planned device has {view?.octets}.
        </p>
      ) : null}
    </div>
  );
}

async function loadDescription(id: string | undefined): Promise<DeviceDescription | undefined> {
  if (id === undefined) return undefined;
  const response = await fetch(`/devices/${id}/description`);
  return response.ok ? ((await response.json()) as DeviceDescription) : undefined;
}
