import { ArrowLeftRight, Download } from "lucide-react";
import { useMemo, useState, type ReactNode } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { NODE_CLASSES } from "~/domain/address-space/id-policy";
import type { Node, NodeClass } from "~/domain/address-space/node";
import { formatNodeId, parseNodeId, type NodeId, type NodeKey } from "~/domain/address-space/node-id";
import { getOwnNamespace } from "~/domain/address-space/model-header";
import { renumberNodes } from "~/domain/editing/commands/renumber-nodes";
import { checkProposals, listNodeIdUses, proposeNodeIds } from "~/domain/editing/propose-node-ids";
import { writeCsvLine } from "~/utils/write-csv";
import { describe } from "../model/edit-steps";
import { formatPath } from "../model/member-facts";
import { formatLocalNodeId } from "../model/namespace-label";
import { useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { Input, Select } from "../ui/field";
import { Notice } from "../ui/notice";
import { downloadText } from "./download-text";
import { RenumberTable } from "./renumber-table";
import { RuleForm, type RuleChoice } from "./rule-form";

type Props = { space: AddressSpace; record: ReactNode; editBlockedBy: string | undefined };

type Applied = { readonly count: number; readonly csv: string };

const WHICH = ["all", "changed", "in trouble"] as const;

/** NodeIds as they are and as they are to be: by a rule or by hand, with every use, applied as one edit. */
export function RenumberView({ space, record, editBlockedBy }: Props) {
  const { actions } = useOpenModel();
  const [choice, setChoice] = useState<RuleChoice>({
    kind: "numbers",
    from: 1,
    ranges: space.own.header.idPolicy?.kind === "ranges" ? space.own.header.idPolicy.ranges : {},
    separator: ".",
  });
  const [changes, setChanges] = useState<ReadonlyMap<NodeKey, NodeId>>(new Map());
  const [unread, setUnread] = useState<ReadonlyMap<NodeKey, string>>(new Map());
  const [picked, setPicked] = useState<ReadonlySet<NodeKey>>(new Set());
  const [filter, setFilter] = useState("");
  const [nodeClass, setNodeClass] = useState<NodeClass | "">("");
  const [which, setWhich] = useState<(typeof WHICH)[number]>("all");
  const [applied, setApplied] = useState<Applied>();

  const nodes = useMemo(() => space.listOwnNodes(), [space]);
  const uses = useMemo(
    () =>
      listNodeIdUses(
        space,
        nodes.map((node) => node.key),
      ),
    [space, nodes],
  );
  const problems = useMemo(() => checkProposals(space, changes), [space, changes]);
  const inScope = useMemo(
    () => nodes.filter((node) => isWanted(space, node, filter, nodeClass)),
    [space, nodes, filter, nodeClass],
  );
  const rows = inScope.filter(
    (node) =>
      which === "all" ||
      (which === "changed"
        ? changes.has(node.key) || unread.has(node.key)
        : problems.has(node.key) || unread.has(node.key)),
  );
  const rewritten = useMemo(() => new Set([...changes.keys()].flatMap((key) => uses.get(key) ?? [])), [changes, uses]);

  function withChange(key: NodeKey, id: NodeId | undefined): Map<NodeKey, NodeId> {
    const next = new Map(changes);
    const now = space.getNode(key)?.nodeId;
    if (!id || (now && formatNodeId(now) === formatNodeId(id))) next.delete(key);
    else next.set(key, id);
    return next;
  }
  function write(key: NodeKey, text: string): void {
    const id = parseLocal(space, text);
    const left = new Map(unread);
    if (text.trim() === "" || id) left.delete(key);
    else left.set(key, text);
    setUnread(left);
    if (id || text.trim() === "") setChanges(withChange(key, id));
  }
  function propose(): void {
    const proposed = proposeNodeIds(space, inScope, choice);
    const next = new Map(changes);
    for (const node of inScope) {
      const id = proposed.get(node.key);
      if (!id || formatNodeId(id) === formatNodeId(node.nodeId)) next.delete(node.key);
      else next.set(node.key, id);
    }
    setChanges(next);
    setWhich("changed");
  }
  const pair = [...picked].flatMap((key) => space.getNode(key) ?? []);
  function swap(): void {
    const [one, other] = pair;
    if (!one || !other) return;
    const next = withChange(one.key, changes.get(other.key) ?? other.nodeId);
    next.set(other.key, changes.get(one.key) ?? one.nodeId);
    setChanges(next);
    setPicked(new Set());
  }
  function clear(): void {
    setChanges(new Map());
    setUnread(new Map());
    setWhich("all");
  }
  function apply(): void {
    const csv = writeCsv(space, changes);
    const intent = { changes: [...changes].map(([node, nodeId]) => ({ node, nodeId })) };
    if (!actions.apply("renumber-nodes", (current, context) => renumberNodes(current, context, intent))) return;
    setApplied({ count: changes.size, csv });
    clear();
  }

  const trouble = problems.size + unread.size;
  const blockedBy =
    editBlockedBy ??
    (changes.size === 0 ? "no NodeId changes yet" : trouble > 0 ? `${trouble} of them cannot be` : undefined);
  return (
    <div className="grid gap-4">
      <p className="max-w-180 text-body text-ink-2">
        Clients, dashboards and gateways find nodes by their NodeIds; whoever kept an old one will not find its node any
        more. References and the mapping follow by themselves, values that name a NodeId are rewritten. Old NodeIds are
        never given again.
      </p>
      {applied ? (
        <Notice
          tone="good"
          live
          title={`${applied.count} ${applied.count === 1 ? "node has" : "nodes have"} another NodeId.`}
          action={
            <Button
              size="small"
              icon={Download}
              onClick={() => downloadText("node-ids-old-and-new.csv", "text/csv", applied.csv)}
            >
              Old and new as CSV
            </Button>
          }
        />
      ) : null}
      <RuleForm choice={choice} onChange={setChoice} onPropose={propose} count={inScope.length} />
      <div className="flex flex-wrap items-center gap-2">
        <Input
          type="search"
          size="small"
          className="w-64!"
          aria-label="Nodes by name, path or NodeId"
          placeholder="Name, path or NodeId"
          value={filter}
          onChange={(event) => setFilter(event.currentTarget.value)}
        />
        <Select
          size="small"
          className="w-40!"
          aria-label="Node class"
          value={nodeClass}
          onChange={(event) => setNodeClass(event.currentTarget.value as NodeClass | "")}
        >
          <option value="">every class</option>
          {NODE_CLASSES.map((name) => (
            <option key={name}>{name}</option>
          ))}
        </Select>
        <Select
          size="small"
          className="w-36!"
          aria-label="Rows"
          value={which}
          onChange={(event) => setWhich(event.currentTarget.value as (typeof WHICH)[number])}
        >
          {WHICH.map((name) => (
            <option key={name}>{name}</option>
          ))}
        </Select>
        <Button
          size="small"
          icon={ArrowLeftRight}
          blockedBy={pair.length === 2 ? undefined : "tick two nodes"}
          onClick={swap}
        >
          Swap the two ticked
        </Button>
        <span className="ml-auto text-note text-ink-3" role="status">
          <span className="font-mono">{changes.size}</span> {changes.size === 1 ? "change" : "changes"},{" "}
          <span className="font-mono">{rewritten.size}</span> {rewritten.size === 1 ? "value" : "values"} to rewrite
          {trouble > 0 ? <b className="text-error">, {trouble} in trouble</b> : null}
        </span>
        <Button size="small" tone="bare" disabled={changes.size + unread.size === 0} onClick={clear}>
          Clear
        </Button>
        <Button size="small" tone="main" blockedBy={blockedBy} onClick={apply}>
          Renumber
        </Button>
      </div>
      <RenumberTable
        space={space}
        rows={rows}
        changes={changes}
        uses={uses}
        reasonOf={(key) =>
          unread.has(key)
            ? "A NodeId reads i=1001, s=Hall.B1, g=… or b=…"
            : problems.has(key)
              ? describe(
                  space,
                  [problems.get(key)].flatMap((p) => p ?? []),
                ).join(" ")
              : undefined
        }
        picked={picked}
        onPick={(key) =>
          setPicked((old) => (old.has(key) ? new Set([...old].filter((k) => k !== key)) : new Set([...old, key])))
        }
        textOf={(key) => unread.get(key) ?? (changes.has(key) ? formatLocalNodeId(changes.get(key) as NodeId) : "")}
        onWrite={write}
        readOnly={editBlockedBy !== undefined}
      />
      {record}
    </div>
  );
}

function isWanted(space: AddressSpace, node: Node, filter: string, nodeClass: NodeClass | ""): boolean {
  if (nodeClass !== "" && node.nodeClass !== nodeClass) return false;
  const text = filter.trim().toLowerCase();
  return (
    text === "" ||
    formatLocalNodeId(node.nodeId).toLowerCase().includes(text) ||
    formatPath(space, node.key).toLowerCase().includes(text)
  );
}

/** `i=7`, `7` and `s=Name` are of the model's own namespace. */
function parseLocal(space: AddressSpace, text: string): NodeId | undefined {
  const trimmed = text.trim();
  const parsed = parseNodeId(/^\d+$/.test(trimmed) ? `i=${trimmed}` : trimmed, []);
  if (!parsed.ok) return undefined;
  const namespaceUri = getOwnNamespace(space.own.header);
  return { ...parsed.value, namespaceUri };
}

function writeCsv(space: AddressSpace, changes: ReadonlyMap<NodeKey, NodeId>): string {
  const lines = [...changes].flatMap(([key, to]) => {
    const node = space.getNode(key);
    return node ? [writeCsvLine([formatPath(space, key), formatNodeId(node.nodeId), formatNodeId(to)])] : [];
  });
  return writeCsvLine(["Path", "Before", "After"]) + lines.join("");
}
