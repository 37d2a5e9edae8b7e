import type { ReviewPage } from "~/services/read-review.server";

const LINE = 44;
const STEP = 92;
const MAX_PAST = 3;

/** The versions so far, and the two ways out: as proposed, or gently when every breaking change is taken back. */
export function VersionFork({ page }: { page: ReviewPage }) {
  const { base, revision, proposedVersion, gentleVersion, changes, readers, model } = page;
  const breaking = changes.filter((change) => change.rating === "breaking").length;
  const stopped = readers.filter((reader) =>
    changes.some((c) => c.readers.some((r) => r.id === reader.id && r.effect === "stops")),
  ).length;
  const past = page.releases
    .filter((release) => !release.isWithdrawn && release.version !== revision.name)
    .slice(-MAX_PAST);
  const marks = [...(past.length > 0 ? past.map((release) => release.version) : [base.name]), revision.name];
  const x = (index: number): number => 46 + index * STEP;
  const last = x(marks.length - 1);
  const end = last + 190;
  const hasFork = breaking > 0 && gentleVersion !== proposedVersion;
  const text = { x: end + 16, className: "fill-ink font-mono text-[15px] font-bold" };
  return (
    <svg
      role="img"
      aria-label={`Proposed version ${proposedVersion}${hasFork ? `, or ${gentleVersion} without the breaking changes` : ""}`}
      viewBox="0 0 850 100"
      className="block w-full max-w-[850px]"
    >
      <path d={`M${x(0)} ${LINE}H${last}`} className="stroke-ink" strokeWidth={1.5} fill="none" />
      {marks.map((mark, i) => (
        <g key={`${mark} ${i}`}>
          <circle
            cx={x(i)}
            cy={LINE}
            r={5}
            className={i === marks.length - 1 ? "fill-leaf stroke-ink" : "fill-ink stroke-ink"}
            strokeWidth={1.5}
          />
          <text x={x(i)} y={LINE - 14} textAnchor="middle" className="fill-ink font-mono text-[12.5px] font-semibold">
            {mark}
          </text>
        </g>
      ))}
      {hasFork ? (
        <>
          <path
            d={`M${last + 6} ${LINE}C${last + 60} ${LINE} ${last + 50} 20 ${last + 110} 20H${end}`}
            className="stroke-copper"
            strokeWidth={2}
            fill="none"
          />
          <circle cx={end} cy={20} r={5.5} className="fill-copper" />
          <text {...text} y={19} className="fill-copper font-mono text-[15px] font-bold">
            {gentleVersion}
          </text>
          <text x={end + 74} y={19} className="fill-ink text-[13px] font-medium">
            {breaking === 1
              ? "when the breaking change is taken back"
              : `when the ${breaking} breaking changes are taken back`}
          </text>
          <text x={end + 16} y={35} className="fill-ink-3 text-[11.5px]">
            Namespace stays. Readers need not change.
          </text>
          <path
            d={`M${last + 6} ${LINE}C${last + 60} ${LINE} ${last + 50} 72 ${last + 110} 72H${end}`}
            className="stroke-ink-3"
            strokeWidth={1.5}
            strokeDasharray="5 4"
            fill="none"
          />
          <circle cx={end} cy={72} r={5} className="fill-leaf stroke-ink-3" strokeWidth={1.5} />
          <text {...text} y={71}>
            {proposedVersion}
          </text>
          <text x={end + 74} y={71} className="fill-ink text-[13px] font-medium">
            as proposed
          </text>
          <text x={end + 16} y={87} className="fill-ink-3 text-[11.5px]">
            {`Better a new namespace ${suggestNamespace(model.namespaceUri, proposedVersion)}. ${stopped === 0 ? "No named reader" : stopped === 1 ? "One reader" : `${stopped} readers`} must change first.`}
          </text>
        </>
      ) : (
        <>
          <path d={`M${last + 6} ${LINE}H${end}`} className="stroke-copper" strokeWidth={2} fill="none" />
          <circle cx={end} cy={LINE} r={5.5} className="fill-copper" />
          <text {...text} y={LINE - 1} className="fill-copper font-mono text-[15px] font-bold">
            {proposedVersion}
          </text>
          <text x={end + 74} y={LINE - 1} className="fill-ink text-[13px] font-medium">
            as proposed
          </text>
          <text x={end + 16} y={LINE + 15} className="fill-ink-3 text-[11.5px]">
            {breaking > 0 ? "Readers must look before it goes out." : "Namespace stays. Readers need not change."}
          </text>
        </>
      )}
    </svg>
  );
}

/** OPC 11030 §11.3 recommends the old URI with `V2/` and the like behind it. */
function suggestNamespace(uri: string, version: string): string {
  const tail =
    uri
      .split(/[/:#]+/)
      .filter(Boolean)
      .at(-1) ?? uri;
  return `…/${tail}/V${version.split(".")[0] ?? ""}/`;
}
