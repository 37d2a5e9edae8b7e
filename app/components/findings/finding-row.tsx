import type { ReactNode } from "react";
import { ArrowRight } from "lucide-react";
import { Link } from "react-router";
import { FindingShape } from "~/components/notation/finding-badge";
import { NodeClassGlyph } from "~/components/notation/node-class-glyph";
import { Button } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Icon } from "~/components/ui/icon";
import { Tag } from "~/components/ui/tag";
import { isProperty } from "~/components/model/member-facts";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Finding } from "~/domain/checks/finding";
import { findRule } from "~/domain/checks/registry";
import { AcceptFinding } from "./accept-finding";
import { FindingPlace } from "./finding-place";
import { MendPreview } from "./mend-preview";

export type FindingTools = {
  readonly space: AddressSpace;
  readonly modelId: string;
  /** Mends these in one undo step; absent where the person may not edit. */
  readonly mend: ((findings: readonly Finding[]) => void) | undefined;
  readonly mendBlockedBy: string | undefined;
  /** Accepts the finding as it is; answers why not, or undefined. Absent where the person may not. */
  readonly accept: ((finding: Finding, reason: string) => Promise<string | undefined>) | undefined;
  readonly reopen: ((waiverId: string) => Promise<string | undefined>) | undefined;
};

function toParentPath(finding: Finding): string {
  return finding.key === undefined ? "" : finding.path.split("/").slice(0, -1).join(" / ");
}

function showLinks(finding: Finding, modelId: string) {
  const query = finding.key === undefined ? "" : `?node=${encodeURIComponent(finding.key)}`;
  const base = `/models/${modelId}`;
  return { sheet: `${base}/sheet${query}`, register: `${base}/register${query}`, source: `${base}/source${query}` };
}

type RowProps = { finding: Finding; tools: FindingTools; open: boolean; onToggle: () => void; showsRule?: boolean };

/** One finding: a line, and opened the place, the facts and the way out. */
export function FindingRow({ finding, tools, open, onToggle, showsRule }: RowProps) {
  const { space, modelId, mend } = tools;
  const node = finding.key === undefined ? undefined : space.getNode(finding.key);
  const rule = findRule(finding.rule);
  const parent = toParentPath(finding);
  const links = showLinks(finding, modelId);
  return (
    <li className={cx("border-b border-hair last:border-b-0", open && "bg-leaf shadow-[inset_3px_0_0_var(--copper)]")}>
      <div className="grid min-h-7 grid-cols-[minmax(0,1fr)_auto] items-center gap-3 pr-3 hover:bg-bench">
        <button
          type="button"
          aria-expanded={open}
          onClick={onToggle}
          className="grid min-h-7 grid-cols-[20px_minmax(0,5fr)_minmax(0,7fr)] items-center gap-x-2 py-0.5 pl-[46px] text-left text-small focus-visible:-outline-offset-2"
        >
          {node ? (
            <NodeClassGlyph kind={isProperty(space, node) ? "Property" : node.nodeClass} label />
          ) : (
            <FindingShape severity={finding.severity} />
          )}
          <span className={cx(open ? "" : "truncate")}>
            {showsRule ? <span className="mr-2 font-mono text-ink-2">{finding.rule}</span> : null}
            <b className={cx("font-semibold", node?.nodeClass.endsWith("Type") && "italic")}>
              {finding.browseName || finding.place?.name || "Model"}
            </b>
            {parent ? (
              <span className="text-ink-2">
                {" "}
                in <i>{parent}</i>
              </span>
            ) : null}
          </span>
          <span className={cx("text-ink-2", open ? "" : "truncate")}>{finding.message}</span>
        </button>
        <span className="flex w-21 items-center justify-end gap-3 text-small">
          {rule?.fix && mend && !open ? (
            <button
              type="button"
              onClick={() => mend([finding])}
              className="border-b border-rule font-medium hover:border-copper hover:text-copper"
              title={rule.fix.label}
            >
              Mend
            </button>
          ) : null}
          <Link
            to={links.register}
            className="border-b border-rule font-medium hover:border-copper hover:text-copper"
            aria-label={`Show ${finding.browseName || "the model"} in the register`}
          >
            Show
          </Link>
        </span>
      </div>
      {open ? <FindingDetail finding={finding} tools={tools} /> : null}
    </li>
  );
}

function FindingDetail({ finding, tools }: { finding: Finding; tools: FindingTools }) {
  const rule = findRule(finding.rule);
  const links = showLinks(finding, tools.modelId);
  return (
    <div className="grid grid-cols-[260px_minmax(0,1fr)_minmax(220px,300px)] border-t border-hair">
      <section className="px-5 py-3">
        <h3 className="mb-2 text-note font-medium text-ink-3">Where</h3>
        <FindingPlace space={tools.space} nodeKey={finding.key} />
        <p className="mt-3 font-mono text-note break-all text-ink-3">{finding.nodeId}</p>
      </section>
      <section className="border-l border-hair px-5 py-3">
        <h3 className="mb-2 text-note font-medium text-ink-3">
          {finding.facts.length > 1 ? "Facts that do not fit" : "The fact"}
        </h3>
        <dl className="grid grid-cols-[88px_minmax(0,1fr)] gap-x-3 gap-y-1.5 text-small">
          {finding.facts.length === 0 ? <Fact label="Found">{finding.message}</Fact> : null}
          {finding.facts.map((fact, i) => (
            <Fact key={fact} label={i === 0 ? "Found" : "and"}>
              {fact}
            </Fact>
          ))}
          {finding.attribute ? (
            <Fact label="Attribute">
              <span className="font-mono">{finding.attribute}</span>
            </Fact>
          ) : null}
          {rule ? <Fact label="Must hold">{rule.condition}</Fact> : null}
          {rule ? <Fact label="If ignored">{rule.why}</Fact> : null}
          <Fact label="Clause">
            <span className="flex flex-wrap items-center gap-2">
              <Tag>{finding.clause}</Tag>
              <Link
                to={`/rules/${finding.rule}`}
                className="border-b border-rule font-medium hover:border-copper hover:text-copper"
              >
                Help on {finding.rule}
              </Link>
            </span>
          </Fact>
        </dl>
        {rule?.fix ? (
          <div className="mt-4 border-t border-hair pt-3">
            <h3 className="mb-2 text-note font-medium text-ink-3">What mending changes</h3>
            <MendPreview space={tools.space} findings={[finding]} />
          </div>
        ) : null}
      </section>
      <section className="border-l border-hair px-5 py-3">
        <h3 className="mb-2 text-note font-medium text-ink-3">What to do</h3>
        {rule?.fix ? (
          <>
            <p className="mb-2 flex items-start gap-1.5 text-small">
              <Icon of={ArrowRight} className="mt-0.5 shrink-0 text-ink-3" />
              {rule.fix.label}
            </p>
            <div className="mb-2 flex items-center gap-3">
              <Button tone="main" blockedBy={tools.mendBlockedBy} onClick={() => tools.mend?.([finding])}>
                Mend
              </Button>
              <span className="text-note text-ink-3">undone with one step</span>
            </div>
          </>
        ) : (
          <p className="mb-2 text-small text-ink-2">Mend it by hand where the node stands.</p>
        )}
        <p className="flex flex-wrap gap-2">
          <LinkToNode to={links.register}>In the register</LinkToNode>
          <LinkToNode to={links.sheet}>On the sheet</LinkToNode>
          <LinkToNode to={links.source}>In the source text</LinkToNode>
        </p>
        {tools.accept ? <AcceptFinding finding={finding} accept={tools.accept} /> : null}
      </section>
    </div>
  );
}

function Fact({ label, children }: { label: string; children: ReactNode }) {
  return (
    <>
      <dt className="text-note leading-[17px] text-ink-3">{label}</dt>
      <dd>{children}</dd>
    </>
  );
}

function LinkToNode({ to, children }: { to: string; children: string }) {
  return (
    <Link
      to={to}
      className="inline-flex h-6 items-center rounded-edge border border-edge bg-leaf px-2 text-small font-medium hover:bg-bench-2"
    >
      {children}
    </Link>
  );
}
