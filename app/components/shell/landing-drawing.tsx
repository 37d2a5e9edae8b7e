const signals = [
  { y: 70, raw: "0x017C", tag: "port 1", name: "CreelDistance", value: "38.0 mm" },
  { y: 134, raw: "0x2C87", tag: "port 2", name: "CarriagePosition", value: "113.99 mm" },
  { y: 198, raw: "10 … 11", tag: "register", name: "SpindleSpeed", value: "142.6 r/min" },
  { y: 262, raw: "0x0282", tag: "port 3", name: "GearboxTemperature", value: "64.2 °C" },
  { y: 326, raw: "2 … 3", tag: "meter", name: "ActiveEnergy", value: "4 812.07 kW·h" },
] as const;

const frame = { stroke: "var(--rule)", fill: "none" } as const;

/** Raw signals on wires, each with its ferrule, landed in the Variables of one type. A picture, not data. */
export function LandingDrawing() {
  return (
    <svg
      viewBox="0 0 720 430"
      className="w-full max-w-200"
      role="img"
      aria-label="Raw signals land, each by a ferrule, in the Variables of one machine type"
    >
      <rect x="1" y="1" width="718" height="428" {...frame} />
      {[1, 2, 3, 4, 5, 6].map((zone) => (
        <text
          key={zone}
          x={zone * 120 - 60}
          y="14"
          textAnchor="middle"
          fontSize="10"
          fontFamily="var(--mono)"
          fill="var(--ink-3)"
        >
          {zone}
        </text>
      ))}
      {["A", "B", "C", "D"].map((zone, i) => (
        <text
          key={zone}
          x="9"
          y={70 + i * 103}
          textAnchor="middle"
          fontSize="10"
          fontFamily="var(--mono)"
          fill="var(--ink-3)"
        >
          {zone}
        </text>
      ))}
      <rect x="18" y="20" width="684" height="392" fill="var(--paper)" stroke="var(--ink)" strokeWidth="1.5" />
      <rect x="426" y="38" width="252" height="356" fill="var(--shade)" />
      <rect x="420" y="32" width="252" height="356" fill="var(--leaf)" stroke="var(--ink)" strokeWidth="1.5" />
      {signals.map((signal, i) => (
        <Signal key={signal.name} {...signal} color={i === 1 ? "var(--copper)" : "var(--ink)"} />
      ))}
      <text x="436" y="376" fontSize="13.5" fontStyle="italic" fontWeight="600" fill="var(--ink)">
        RopeBraiderType
      </text>
      <text x="656" y="376" textAnchor="end" fontSize="11" fontFamily="var(--mono)" fill="var(--ink-3)">
        ObjectType
      </text>
      <path d="M420 358h252" stroke="var(--ink)" />
    </svg>
  );
}

function Signal({
  y,
  raw,
  tag,
  name,
  value,
  color,
}: {
  y: number;
  raw: string;
  tag: string;
  name: string;
  value: string;
  color: string;
}) {
  return (
    <g>
      <text x="38" y={y - 8} fontSize="11" fill="var(--ink-3)">
        {tag}
      </text>
      <text x="38" y={y + 22} fontSize="12" fontFamily="var(--mono)" fill="var(--ink-2)">
        {raw}
      </text>
      <path d={`M38 ${y}H296`} stroke={color} strokeWidth="1.75" fill="none" />
      <path
        d={`M296 ${y - 13}l18 6h52v14h-52l-18 6z`}
        fill="var(--copper)"
        stroke="var(--copper)"
        strokeLinejoin="round"
      />
      <path d={`M306 ${y - 9}v18M352 ${y - 7}v14M358 ${y - 7}v14`} stroke="var(--paper)" strokeWidth="1.2" />
      <path d={`M366 ${y}H436`} stroke={color} strokeWidth="1.75" />
      <path d={`M410 ${y - 12}h10v24h-10z`} fill="var(--bench-2)" stroke="var(--ink)" strokeWidth="1.25" />
      <circle cx="415" cy={y} r="2.2" fill="var(--ink)" />
      <rect x="436" y={y - 22} width="220" height="44" rx="14" fill="var(--leaf)" stroke={color} strokeWidth="1.5" />
      <text x="452" y={y - 3} fontSize="12.5" fontWeight="600" fill="var(--ink)">
        {name}
      </text>
      <text x="452" y={y + 14} fontSize="12" fontFamily="var(--mono)" fill="var(--ink-2)">
        {value}
      </text>
    </g>
  );
}
