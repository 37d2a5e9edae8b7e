import { useMemo } from "react";
import { NodeClassGlyph } from "~/components/notation/node-class-glyph";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Finding } from "~/domain/checks/finding";
import type { ChangeDetail, NodeChange } from "~/domain/checks/list-changes";
import { previewMend } from "./mend-findings";

const MAX_SHOWN = 40;
const marks: Record<NodeChange["kind"], string> = { added: "New", removed: "Removed", changed: "Changed" };

/** What a fix changes: each node with its attributes and references, old and new. */
export function MendPreview({ space, findings }: { space: AddressSpace; findings: readonly Finding[] }) {
  const preview = useMemo(() => previewMend(space, findings), [space, findings]);
  const { changes, header, count, reasons } = preview;
  const shown = changes.slice(0, MAX_SHOWN);
  return (
    <div role="region" aria-label="What mending changes" className="text-small">
      {findings.length > 1 ? (
        <p className="mb-2">
          Mends <b className="font-mono">{count}</b> of <b className="font-mono">{findings.length}</b> findings and
          touches <b className="font-mono">{changes.length}</b> {changes.length === 1 ? "node" : "nodes"}.
        </p>
      ) : null}
      <ul className="grid gap-2">
        {header.length > 0 ? (
          <li>
            <p className="font-semibold">The model’s header</p>
            <Details details={header} />
          </li>
        ) : null}
        {shown.map((change) => (
          <li key={change.key}>
            <p className="flex items-center gap-1.5">
              <NodeClassGlyph kind={change.nodeClass} label />
              <b className="font-semibold">{change.name}</b>
              {change.kind === "changed" ? null : <span className="text-ink-2">{marks[change.kind]}</span>}
              <span className="truncate text-note text-ink-3">{change.path}</span>
            </p>
            <Details details={change.details} />
          </li>
        ))}
      </ul>
      {changes.length > shown.length ? (
        <p className="mt-2 text-ink-3">and {changes.length - shown.length} more nodes in the same way</p>
      ) : null}
      {reasons.map((reason) => (
        <p key={reason} className="mt-2 text-ink-2">
          {reason}
        </p>
      ))}
    </div>
  );
}

function Details({ details }: { details: readonly ChangeDetail[] }) {
  return (
    <dl className="grid grid-cols-[96px_minmax(0,1fr)] gap-x-2 pl-[19px] text-note">
      {details.map(({ label, before, after }) => (
        <div key={`${label} ${before ?? ""} ${after ?? ""}`} className="contents">
          <dt className="text-ink-3">{label}</dt>
          <dd className="min-w-0 [overflow-wrap:anywhere]">
            {before === undefined ? null : (
              <del className="text-ink-3" aria-label={`before ${before}`}>
                {before || "empty"}
              </del>
            )}
            {before !== undefined && after !== undefined ? <span aria-hidden> → </span> : null}
            {after === undefined ? null : (
              <ins className="font-medium no-underline" aria-label={`after ${after}`}>
                {after || "empty"}
              </ins>
            )}
          </dd>
        </div>
      ))}
    </dl>
  );
}
