/** Two states of a model side by side: owners and members of both, each pair on one line. */
import type { LocalizedText } from "../address-space/qualified-name";
import { formatTexts } from "../compare/describe-facts";
import type { InterfaceDocument, InterfaceMember, InterfaceOwner } from "./interface-document";

export type Cells = {
  readonly path: string;
  readonly nodeClass: string;
  readonly nodeId: string;
  readonly dataType: string;
  readonly unit: string;
  readonly range: string;
  readonly access: string;
  readonly rule: string;
  readonly description: string;
};

export type AlignedMember = {
  readonly difference: "same" | "added" | "removed" | "changed";
  readonly before: Cells | null;
  readonly after: Cells | null;
  /** Names of the cells that differ. */
  readonly changed: readonly (keyof Cells)[];
};

export type AlignedOwner = {
  readonly name: string;
  readonly kind: InterfaceOwner["kind"];
  readonly nodeId: string;
  readonly basedOn: { readonly before: string | null; readonly after: string | null };
  readonly difference: AlignedMember["difference"];
  readonly members: readonly AlignedMember[];
};

/** Owners with differences first, each group in the order of the later state; what was removed stands at its end. */
export function alignInterfaces(before: InterfaceDocument, after: InterfaceDocument): AlignedOwner[] {
  const owners = alignBy(before.owners, after.owners, ({ nodeId }) => nodeId).map(([old, now]) => alignOwner(old, now));
  return [...owners.filter((o) => o.difference !== "same"), ...owners.filter((o) => o.difference === "same")];
}

function alignOwner(old: InterfaceOwner | undefined, now: InterfaceOwner | undefined): AlignedOwner {
  const owner = (now ?? old) as InterfaceOwner;
  const members = alignBy(
    old?.members ?? [],
    now?.members ?? [],
    ({ nodeId, path }) => `${nodeId} ${path.split("/").length}`,
  ).map(([a, b]) => alignMember(a, b));
  const isChanged =
    old?.basedOn !== now?.basedOn || old?.name !== now?.name || members.some((member) => member.difference !== "same");
  return {
    name: owner.name,
    kind: owner.kind,
    nodeId: owner.nodeId,
    basedOn: { before: old?.basedOn ?? null, after: now?.basedOn ?? null },
    difference: !old ? "added" : !now ? "removed" : isChanged ? "changed" : "same",
    members,
  };
}

function alignMember(old: InterfaceMember | undefined, now: InterfaceMember | undefined): AlignedMember {
  const [before, after] = [old ? toCells(old) : null, now ? toCells(now) : null];
  if (!before || !after) return { difference: before ? "removed" : "added", before, after, changed: [] };
  const changed = (Object.keys(after) as (keyof Cells)[]).filter((name) => before[name] !== after[name]);
  return { difference: changed.length > 0 ? "changed" : "same", before, after, changed };
}

function toCells(member: InterfaceMember): Cells {
  return {
    path: member.path,
    nodeClass: member.nodeClass,
    nodeId: member.nodeId,
    dataType: member.dataType ?? member.typeDefinition ?? "",
    unit: member.unit ?? "",
    range: member.range ?? "",
    access: member.access ?? "",
    rule: member.isOptional ? "optional" : "",
    description: toText(member.description),
  };
}

function toText(texts: readonly LocalizedText[]): string {
  return formatTexts(texts) ?? "";
}

function alignBy<T>(
  before: readonly T[],
  after: readonly T[],
  idOf: (item: T) => string,
): [T | undefined, T | undefined][] {
  const old = new Map(before.map((item) => [idOf(item), item]));
  const rows = after.map((now): [T | undefined, T | undefined] => {
    const id = idOf(now);
    const match = old.get(id);
    old.delete(id);
    return [match, now];
  });
  return [...rows, ...[...old.values()].map((item): [T | undefined, T | undefined] => [item, undefined])];
}
