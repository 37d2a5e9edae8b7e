import { useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Node } from "~/domain/address-space/node";
import type { NodeId, NodeKey } from "~/domain/address-space/node-id";
import { StandardReferenceType } from "~/domain/address-space/standard-ids";
import { formatPath, getNodeName, isProperty } from "../model/member-facts";
import { formatLocalNodeId } from "../model/namespace-label";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { Button } from "../ui/button";
import { Checkbox, Input } from "../ui/field";
import { Table, TableScroll, Td, Th, Tr } from "../ui/table";

type Props = {
  space: AddressSpace;
  rows: readonly Node[];
  changes: ReadonlyMap<NodeKey, NodeId>;
  uses: ReadonlyMap<NodeKey, readonly NodeKey[]>;
  reasonOf: (key: NodeKey) => string | undefined;
  picked: ReadonlySet<NodeKey>;
  onPick: (key: NodeKey) => void;
  textOf: (key: NodeKey) => string;
  onWrite: (key: NodeKey, text: string) => void;
  readOnly: boolean;
};

/** Rows drawn at once; the filter finds the others. */
const PAGE = 200;

export function RenumberTable(props: Props) {
  const { rows } = props;
  const [page, setPage] = useState(0);
  const first = Math.min(page, Math.max(0, Math.ceil(rows.length / PAGE) - 1)) * PAGE;
  return (
    <>
      <TableScroll label="Nodes">
        <Table caption="NodeIds now and to be">
          <thead>
            <tr>
              <Th>
                <span className="sr-only">Tick</span>
              </Th>
              <Th>Node</Th>
              <Th>NodeId now</Th>
              <Th>NodeId to be</Th>
              <Th>Uses</Th>
            </tr>
          </thead>
          <tbody>
            {rows.slice(first, first + PAGE).map((node) => (
              <Row key={node.key} {...props} node={node} />
            ))}
          </tbody>
        </Table>
      </TableScroll>
      {rows.length === 0 ? <p className="text-small text-ink-2">No node answers the filter.</p> : null}
      {rows.length > PAGE ? (
        <p className="flex items-center gap-2 text-small text-ink-2">
          <Button size="small" disabled={first === 0} onClick={() => setPage(first / PAGE - 1)}>
            Earlier
          </Button>
          <Button size="small" disabled={first + PAGE >= rows.length} onClick={() => setPage(first / PAGE + 1)}>
            Later
          </Button>
          <span className="font-mono">
            {first + 1} … {Math.min(first + PAGE, rows.length)} of {rows.length}
          </span>
        </p>
      ) : null}
    </>
  );
}

function Row({
  space,
  node,
  changes,
  uses,
  reasonOf,
  picked,
  onPick,
  textOf,
  onWrite,
  readOnly,
}: Props & { node: Node }) {
  const [isOpen, setOpen] = useState(false);
  const path = formatPlace(space, node);
  const reason = reasonOf(node.key);
  const values = uses.get(node.key) ?? [];
  const references = space.edgesFrom(node.key).length + space.edgesTo(node.key).length;
  const isChanged = changes.has(node.key);
  return (
    <>
      <Tr className={isChanged ? "bg-copper-wash" : ""}>
        <Td className="w-6">
          <Checkbox
            label=""
            aria-label={`Tick ${path}`}
            checked={picked.has(node.key)}
            disabled={readOnly}
            onChange={() => onPick(node.key)}
          />
        </Td>
        <Td className="max-w-110">
          <span className="flex min-w-0 items-center gap-1.5" title={path}>
            <NodeClassGlyph kind={isProperty(space, node) ? "Property" : node.nodeClass} label />
            <span className="truncate">{path}</span>
          </span>
        </Td>
        <Td mono>{formatLocalNodeId(node.nodeId)}</Td>
        <Td className="w-72">
          <Input
            size="small"
            mono
            aria-label={`NodeId to be of ${path}`}
            placeholder="stays"
            value={textOf(node.key)}
            readOnly={readOnly}
            spellCheck={false}
            {...(reason === undefined ? {} : { "aria-invalid": true })}
            onChange={(event) => onWrite(node.key, event.currentTarget.value)}
          />
          {reason === undefined ? null : (
            <p role="alert" className="text-note text-error">
              {reason}
            </p>
          )}
        </Td>
        <Td>
          <button
            type="button"
            aria-expanded={isOpen}
            aria-label={`Uses of ${path}`}
            className="underline decoration-rule underline-offset-3 hover:text-copper"
            onClick={() => setOpen(!isOpen)}
          >
            {references} {references === 1 ? "reference" : "references"}
            {values.length > 0 ? `, ${values.length} ${values.length === 1 ? "value" : "values"}` : ""}
          </button>
        </Td>
      </Tr>
      {isOpen ? (
        <tr>
          <td />
          <td colSpan={4} className="border-b border-hair pb-2 text-small">
            <Uses space={space} node={node} values={values} />
          </td>
        </tr>
      ) : null}
    </>
  );
}

/** Encodings all have the same few names; the DataType says whose they are. */
function formatPlace(space: AddressSpace, node: Node): string {
  const owner = space.findEdgeTo(node.key, StandardReferenceType.HasEncoding)?.source;
  return owner === undefined ? formatPath(space, node.key) : `${getNodeName(space, owner)} / ${node.browseName.name}`;
}

const MOST = 40;

/** Everything that names the node: references follow by themselves, values are rewritten. */
function Uses({ space, node, values }: { space: AddressSpace; node: Node; values: readonly NodeKey[] }) {
  const edges = [
    ...space.edgesTo(node.key).map((edge) => ({ edge, other: edge.source, arrow: "←" })),
    ...space.edgesFrom(node.key).map((edge) => ({ edge, other: edge.target, arrow: "→" })),
  ];
  return (
    <ul className="grid gap-px">
      {values.map((key) => (
        <li key={key}>
          <b>value of {formatPath(space, key)}</b> <span className="text-ink-3">names it and is rewritten</span>
        </li>
      ))}
      {edges.slice(0, MOST).map(({ edge, other, arrow }) => (
        <li key={`${arrow} ${edge.type} ${other}`}>
          <span className="font-mono text-note text-ink-3">
            {arrow} {getNodeName(space, edge.type)}
          </span>{" "}
          {space.isOwn(other) ? formatPath(space, other) : getNodeName(space, other)}
        </li>
      ))}
      {edges.length > MOST ? <li className="text-ink-3">and {edges.length - MOST} more references</li> : null}
    </ul>
  );
}
