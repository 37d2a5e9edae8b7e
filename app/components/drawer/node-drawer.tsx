import type { AddressSpace } from "~/domain/address-space/address-space";
import { hasValueAttributes, type Node } from "~/domain/address-space/node";
import type { Finding } from "~/domain/checks/finding";
import { lazy, Suspense, useEffect, useState, useSyncExternalStore } from "react";
import { formatPath, getNodeName, isProperty } from "../model/member-facts";
import { listRoots } from "../model/list-roots";
import { useOpenModel, useSelection, useSpace, useView } from "../model/use-model";
import { FindingBadge } from "../notation/finding-badge";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { Button } from "../ui/button";
import { Drawer } from "../ui/drawer";
import { cx } from "../ui/cx";
import { IdentityColumn } from "./identity-column";
import { ReferenceColumn } from "./reference-column";
import { TextColumn } from "./text-column";
import { hasDraft, ValueBench } from "./value-bench";
import { ValueColumn } from "./value-column";
import "./drawer.css";

/** The lower row, which is met by scrolling or by dragging the drawer taller. */
const FurtherColumns = lazy(() => import("./further-columns").then((module) => ({ default: module.FurtherColumns })));

/** Particulars of the selected node, for the sheet and the register alike. */
export function NodeDrawer() {
  const { view } = useOpenModel();
  const space = useSpace();
  const selection = useSelection();
  const isOpen = useView((state) => state.isDrawerOpen);
  const key = selection.at(-1);
  const node = key === undefined ? undefined : space.getNode(key);
  if (!isOpen) return <ClosedDrawer />;
  // An empty model has no particulars; the room belongs to the first thing to do.
  if (!node && listRoots(space).length === 0) return null;
  return (
    <Drawer
      label="Particulars"
      storageKey="particulars-height"
      initialHeight={258}
      onClose={() => view.setDrawerOpen(false)}
      head={
        node ? (
          <Head space={space} node={node} more={selection.length - 1} />
        ) : (
          <span className="text-small text-ink-3">Select a node to see its particulars</span>
        )
      }
      tools={node ? <WorstFinding node={node} /> : null}
    >
      {node ? <Columns key={node.key} space={space} node={node} /> : null}
    </Drawer>
  );
}

function ClosedDrawer() {
  const { view } = useOpenModel();
  return (
    <div className="flex h-7 shrink-0 items-center border-t border-rule bg-bench px-5">
      <Button size="small" tone="bare" onClick={() => view.setDrawerOpen(true)}>
        Show particulars
      </Button>
    </div>
  );
}

function Head({ space, node, more }: { space: AddressSpace; node: Node; more: number }) {
  return (
    <>
      <NodeClassGlyph kind={isProperty(space, node) ? "Property" : node.nodeClass} label />
      <h2 className={cx("text-body font-semibold", node.nodeClass.endsWith("Type") && "italic")}>
        {getNodeName(space, node.key)}
      </h2>
      <span className="truncate font-mono text-note text-ink-3">{formatPath(space, node.key)}</span>
      {space.isOwn(node.key) ? null : (
        <span className="text-note text-ink-3">belongs to a required model, read only</span>
      )}
      {more > 0 ? <span className="text-note text-copper">and {more} more selected</span> : null}
    </>
  );
}

function WorstFinding({ node }: { node: Node }) {
  const { findings } = useOpenModel();
  const read = (): Finding | undefined => findings.getState().byNode.get(node.key)?.[0];
  const finding = useSyncExternalStore(findings.subscribe, read, read);
  const count = findings.getState().byNode.get(node.key)?.length ?? 0;
  if (!finding) return null;
  return (
    <span
      className="flex min-w-0 max-w-130 items-center gap-1.5 text-small"
      title={`${finding.rule} ${finding.message}\n${finding.facts.join("\n")}\n${finding.clause}`}
    >
      <FindingBadge severity={finding.severity} title={finding.rule} />
      <span className="truncate">{finding.message}</span>
      {count > 1 ? <span className="shrink-0 text-note text-ink-3">and {count - 1} more</span> : null}
      <MendButton finding={finding} />
    </span>
  );
}

/** The rule's own fix, where it has one. Rules come with the checker, so they are asked for when a finding is there. */
function MendButton({ finding }: { finding: Finding }) {
  const model = useOpenModel();
  const [mend, setMend] = useState<() => void>();
  useEffect(() => {
    let isGone = false;
    void Promise.all([import("../findings/mend-findings"), import("~/domain/checks/registry")]).then(
      ([{ mendFindings }, { findRule }]) => {
        const hasFix = findRule(finding.rule)?.fix !== undefined;
        if (!isGone) setMend(() => (hasFix ? () => mendFindings(model, [finding]) : undefined));
      },
    );
    return () => {
      isGone = true;
    };
  }, [finding, model]);
  if (!mend || !model.actions.canEdit) return null;
  return (
    <Button size="small" onClick={mend}>
      Mend
    </Button>
  );
}

/** Classes whose second column is a table. */
const WIDE: Readonly<Partial<Record<Node["nodeClass"], string>>> = { Method: "is-wide", DataType: "is-data-type" };

function Columns({ space, node }: { space: AddressSpace; node: Node }) {
  const { actions, view } = useOpenModel();
  const readOnly = !actions.mayChange(node.key);
  const [, drawAgain] = useState(0);
  const isValueOpen = useView((state) => state.openValue === node.key) || hasDraft(node.key);
  // A form that was left unfinished is open because of its draft, which no store tells of.
  const close = (): void => {
    view.closeValue();
    drawAgain((n) => n + 1);
  };
  if (isValueOpen && hasValueAttributes(node))
    return <ValueBench space={space} node={node} readOnly={readOnly} onClose={close} />;
  return (
    <>
      <div className={cx("particulars", WIDE[node.nodeClass])}>
        <IdentityColumn space={space} node={node} readOnly={readOnly} />
        <ValueColumn space={space} node={node} readOnly={readOnly} onOpenValue={() => view.openValue(node.key)} />
        <TextColumn node={node} readOnly={readOnly} />
        <ReferenceColumn space={space} node={node} />
      </div>
      <Suspense>
        <FurtherColumns space={space} node={node} readOnly={readOnly} />
      </Suspense>
    </>
  );
}
