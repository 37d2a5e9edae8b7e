import type { Wire } from "./route-wires";

type Props = { wires: readonly Wire[]; selected: ReadonlySet<string>; quiet: ReadonlySet<string> };

/** The wires themselves, behind everything that can be pressed. A wire ends in its terminal. */
export function WireLines({ wires, selected, quiet }: Props) {
  const ordered = [...wires].sort((a, b) => Number(selected.has(a.id)) - Number(selected.has(b.id)));
  return (
    <svg aria-hidden className="pointer-events-none absolute inset-0 size-full overflow-visible" fill="none">
      {ordered.map((wire) => {
        const isHere = selected.has(wire.id);
        return (
          <path
            key={wire.id}
            d={wire.path}
            stroke={isHere ? "var(--copper)" : "var(--ink)"}
            strokeWidth={isHere ? 1.75 : 1.25}
            strokeLinejoin="round"
            {...(quiet.has(wire.id) ? { strokeDasharray: "4 3" } : {})}
          />
        );
      })}
    </svg>
  );
}
