import { lazy, Suspense } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getDataType, getValueRank, type VariableNode, type VariableTypeNode } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { formatProblem } from "~/domain/core/problem-texts";
import { setValue } from "~/domain/editing/commands/set-value";
import { readValue } from "~/domain/nodeset/values/read-value";
import { formatDataType, getNodeName } from "../model/member-facts";
import { getDataTypes } from "../model/read-typed-value";
import { useOpenModel } from "../model/use-model";
import { Notice } from "../ui/notice";
import type { Draft } from "../values/value-draft";

const ValueEditor = lazy(() => import("../values/value-editor").then((module) => ({ default: module.ValueEditor })));

/** What was typed and not committed, by node; it is there again when somebody comes back to the node. */
const drafts = new Map<NodeKey, Draft>();

export function hasDraft(key: NodeKey): boolean {
  return drafts.has(key);
}

type Props = { space: AddressSpace; node: VariableNode | VariableTypeNode; readOnly: boolean; onClose: () => void };

/** The whole drawer for the value of one node. */
export function ValueBench({ space, node, readOnly, onClose }: Props) {
  const { actions } = useOpenModel();
  const read = node.value && readValue(node.value, getDataTypes(space));
  return (
    <Suspense fallback={<p className="p-5 text-small text-ink-3">Opening the value …</p>}>
      <ValueEditor
        label={getNodeName(space, node.key)}
        space={space}
        dataType={getDataType(node)}
        valueRank={getValueRank(node)}
        dimensions={parseDimensions(node.arrayDimensions)}
        value={read?.ok ? read.value : undefined}
        readOnly={readOnly}
        draft={drafts.get(node.key)}
        onDraft={(draft) => (draft ? drafts.set(node.key, draft) : drafts.delete(node.key))}
        mayTakeAway={node.value !== undefined}
        onCommit={(value) => {
          const intent = { node: node.key, ...(value ? { value } : {}) };
          if (actions.apply("set-value", (current, context) => setValue(current, context, intent))) onClose();
        }}
        onDiscard={onClose}
        head={
          <div className="flex items-center gap-2 px-5 pt-2 text-small">
            <h3 className="mb-0! text-note font-semibold text-ink-3">Value</h3>
            <code className="font-mono text-note text-ink-3">{formatDataType(space, node)}</code>
            {read && !read.ok ? (
              <Notice
                tone="warning"
                className="ml-2 py-0.5!"
                title="The value in the file cannot be read, so the form begins anew; until you commit, the file's text stays."
              >
                {read.problems.map(formatProblem).join(" ")}{" "}
                <code className="font-mono break-all">{node.value?.xml.trim().slice(0, 160)}</code>
              </Notice>
            ) : null}
          </div>
        }
      />
    </Suspense>
  );
}

export function parseDimensions(text: string | undefined): number[] {
  return (text ?? "")
    .split(",")
    .filter((part) => part.trim() !== "")
    .map(Number);
}
