import { FindingBadge } from "~/components/notation/finding-badge";
import { DeviceSymbol } from "~/components/devices/device-symbol";
import { cx } from "~/components/ui/cx";
import type { PortView, SourceView } from "~/services/read-sources.server";
import { PortSocket } from "./port-socket";
import type { SourceFinding } from "~/services/list-source-findings.server";
import { modeWords, shortKindWords } from "./source-words";

const PORTS_A_ROW = 8;

type Props = {
  source: SourceView;
  findings: readonly SourceFinding[];
  /** The port that is open in the drawer. */
  selectedPort: number | undefined;
  isSelected: boolean;
  /** Only what belongs to this machine stands out. */
  machine: string | undefined;
  onSelect: (port: number | undefined) => void;
};

/** A master as it hangs in the cabinet: its ports, the cables, and what is on each. */
export function MasterPicture({ source, findings, selectedPort, isSelected, machine, onSelect }: Props) {
  const rows = Array.from({ length: Math.max(1, Math.ceil(source.ports.length / PORTS_A_ROW)) }, (_, row) =>
    source.ports.slice(row * PORTS_A_ROW, (row + 1) * PORTS_A_ROW),
  );
  const own = findings.filter((finding) => finding.port === undefined);
  return (
    <section aria-label={`Master ${source.name}`} className="min-w-240">
      {rows.map((ports, row) => (
        <div key={row}>
          <div
            className="grid border-[1.5px] border-ink bg-bench"
            style={{ gridTemplateColumns: `120px repeat(${PORTS_A_ROW}, minmax(0, 1fr))` }}
          >
            <button
              type="button"
              aria-pressed={isSelected && selectedPort === undefined}
              onClick={() => onSelect(undefined)}
              className={cx(
                "flex flex-col justify-center border-r border-ink px-4 text-left focus-visible:-outline-offset-2",
                isSelected && selectedPort === undefined ? "bg-copper-wash" : "hover:bg-bench-2",
              )}
            >
              <span className="text-title font-bold">{source.name}</span>
              <span className="text-note text-ink-3">{shortKindWords[source.kind]}</span>
              <span className="text-note text-ink-3">
                {row === 0 ? `${source.ports.length} ports` : "further ports"}
              </span>
              {own.length > 0 ? <FindingBadge severity={own[0]?.severity ?? "hint"} count={own.length} /> : null}
            </button>
            {ports.map((port) => (
              <PortCell
                key={port.port}
                source={source}
                port={port}
                findings={findings.filter((finding) => finding.port === port.port)}
                isHere={selectedPort === port.port}
                isFaint={machine !== undefined && !port.bindings.some((binding) => binding.machine === machine)}
                onSelect={() => onSelect(port.port)}
              />
            ))}
          </div>
          <div className="grid" style={{ gridTemplateColumns: `120px repeat(${PORTS_A_ROW}, minmax(0, 1fr))` }}>
            <span />
            {ports.map((port) => (
              <PortLoad
                key={port.port}
                port={port}
                isWrong={findings.some((finding) => finding.port === port.port && finding.severity === "error")}
                isFaint={machine !== undefined && !port.bindings.some((binding) => binding.machine === machine)}
              />
            ))}
          </div>
        </div>
      ))}
    </section>
  );
}

type CellProps = {
  source: SourceView;
  port: PortView;
  findings: readonly SourceFinding[];
  isHere: boolean;
  isFaint: boolean;
  onSelect: () => void;
};

function PortCell({ source, port, findings, isHere, isFaint, onSelect }: CellProps) {
  const { plan, device, bindings } = port;
  const isPlanned = plan !== undefined || bindings.length > 0;
  const words = [
    `Port ${port.port} of ${source.name}`,
    device?.name ?? bindings[0]?.productName ?? (isPlanned ? "planned" : "free"),
    ...bindings.map((binding) => `${binding.machine} ${binding.role}`),
    plan ? `${modeWords[plan.mode]}, class ${plan.portClass}` : "",
    ...findings.map((finding) => finding.message),
  ];
  const worst = findings.find((finding) => finding.severity === "error") ?? findings[0];
  return (
    <button
      type="button"
      aria-label={words.filter((word) => word !== "").join(", ")}
      aria-pressed={isHere}
      onClick={onSelect}
      className={cx(
        "relative grid h-23 justify-items-center border-l border-rule pt-2 first-of-type:border-l-0 focus-visible:-outline-offset-2",
        isHere ? "bg-copper-wash" : "hover:bg-bench-2",
        worst?.severity === "error" && "outline-2 -outline-offset-2 outline-error",
      )}
    >
      <span className="absolute top-1.5 left-2 font-mono text-small font-semibold">{port.port}</span>
      <span className={cx(isFaint && "opacity-40")}>
        <PortSocket isHere={isHere} isWrong={worst?.severity === "error"} isPlugged={isPlanned} />
      </span>
      <span className="absolute top-1.5 right-1.5">
        {worst ? <FindingBadge severity={worst.severity} count={findings.length} title={worst.message} /> : null}
      </span>
      <span className="absolute right-1.5 bottom-1 text-key text-ink-3">
        {plan ? (plan.mode === "DEACTIVATED" ? "off" : `class ${plan.portClass}`) : isPlanned ? "" : "free"}
      </span>
    </button>
  );
}

function PortLoad({ port, isWrong, isFaint }: { port: PortView; isWrong: boolean; isFaint: boolean }) {
  const { plan, device, bindings } = port;
  if (!plan && bindings.length === 0)
    return (
      <p className="mx-3 mt-5 grid h-12 place-items-center border border-dashed border-edge text-note text-ink-3">
        free
      </p>
    );
  const name =
    device?.name ??
    bindings[0]?.productName ??
    (plan?.mode === "DI" || plan?.mode === "DO" ? modeWords[plan.mode] : "no device planned");
  return (
    <div className={cx("px-1 pb-4", isFaint && "opacity-45")}>
      <svg viewBox="0 0 100 18" preserveAspectRatio="none" className="block h-4.5 w-full" fill="none" aria-hidden>
        <path
          d="M50 0V9H22V18"
          stroke={isWrong ? "var(--error)" : "var(--ink)"}
          strokeWidth={2}
          vectorEffect="non-scaling-stroke"
          {...(bindings.length === 0 ? { strokeDasharray: "4 3" } : {})}
        />
      </svg>
      <div className="flex items-start gap-1.5">
        <span className="shrink-0">
          <DeviceSymbol size={34} />
        </span>
        <div className="min-w-0 text-note leading-[14px]">
          {bindings.length === 0 ? <p className="text-ink-3">no machine yet</p> : null}
          {bindings.map((binding) => (
            <p key={`${binding.machineKey} ${binding.role}`} className="truncate">
              <strong className="font-semibold">{binding.machine}</strong> {binding.role}
            </p>
          ))}
          <p className="truncate text-ink-2" title={name}>
            {name}
          </p>
          {plan?.deviceAlias ? <p className="truncate font-mono text-ink-3">{plan.deviceAlias}</p> : null}
        </div>
      </div>
    </div>
  );
}
