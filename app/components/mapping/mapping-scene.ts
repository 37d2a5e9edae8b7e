/** What the mapping page draws, from the model: roles with their frames, members by group, what feeds what. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { listTargets, type Target } from "~/domain/mapping/list-targets";
import type { RowContent } from "~/domain/mapping/mapping";
import type { CheckCase, Role } from "~/domain/mapping/mapping-parts";
import { readTypeMapping, toRowId, type TypeRow } from "~/domain/mapping/type-mapping";
import { describePlace, listRolesOf, type Roles } from "./describe-source";
import type { Connection } from "./use-wires";

/** A terminal of the strip: a Variable with the row that feeds it, or the row by which it writes an output. */
export type Member = {
  /** Id of the row, also while there is none. */
  readonly id: string;
  readonly target: Target;
  readonly row: RowContent | undefined;
};

export type RoleView = {
  readonly name: string;
  readonly role: Role;
  /** Members by `direction/subindex` for process data. */
  readonly fed: ReadonlyMap<string, readonly Member[]>;
  /** Everything else that rows read of the role: registers, parameters, tags, status. */
  readonly points: readonly { readonly pin: string; readonly text: string; readonly members: readonly Member[] }[];
};

export type MappingScene = {
  readonly type: NodeKey;
  readonly roles: Roles;
  readonly roleViews: readonly RoleView[];
  readonly members: readonly Member[];
  readonly connections: readonly Connection[];
  readonly cases: readonly { readonly id: string; readonly value: CheckCase }[];
  /** Rows whose member the type does not have any more. */
  readonly lost: readonly TypeRow[];
};

export function makeMappingScene(space: AddressSpace, type: NodeKey): MappingScene {
  const mapping = readTypeMapping(space, type);
  const roles: Roles = new Map(mapping.roles.map(({ id, value }) => [id, value]));
  const members = listTargets(space, type).flatMap((target) => listMembers(target, mapping.rows));
  return {
    type,
    roles,
    roleViews: orderRoles(
      [...roles].map(([name, role]) => viewRole(name, role, members, roles)),
      members,
    ),
    members,
    connections: members.flatMap((member) => connect(member, roles)),
    cases: mapping.cases,
    lost: mapping.rows.filter((row) => row.info === undefined),
  };
}

/** Sources in the order of the first Variable that each feeds, so that wires are short; those that feed none come last. */
function orderRoles(views: readonly RoleView[], members: readonly Member[]): RoleView[] {
  const placeOf = ({ fed, points }: RoleView): number => {
    const inFrame = [...fed.values()].flat();
    const all = inFrame.length > 0 ? inFrame : points.flatMap((point) => point.members);
    return Math.min(members.length, ...all.map((member) => members.indexOf(member)));
  };
  return [...views].sort((a, b) => placeOf(a) - placeOf(b));
}

/** Properties show only when they are fed. */
function listMembers(target: Target, rows: readonly TypeRow[]): Member[] {
  const own = rows.filter((row) => row.info?.target === target.target);
  const input = own.find(({ row }) => row.direction !== "out");
  const output = own.find(({ row }) => row.direction === "out");
  const hasInput = input !== undefined || (!target.isProperty && output === undefined);
  return [
    ...(hasInput ? [{ id: input?.id ?? toRowId(target.target), target, row: input?.row }] : []),
    ...(output ? [{ id: output.id, target, row: output.row }] : []),
  ];
}

function viewRole(name: string, role: Role, members: readonly Member[], roles: Roles): RoleView {
  const fed = new Map<string, Member[]>();
  const points = new Map<string, { pin: string; text: string; members: Member[] }>();
  for (const member of members) {
    const { row } = member;
    if (!row || !listRolesOf(row.source).includes(name)) continue;
    const { source } = row;
    if (source.kind === "process-data") {
      const key = `${source.direction}/${source.subindex}`;
      fed.set(key, [...(fed.get(key) ?? []), member]);
    } else if (source.kind !== "formula") {
      const pin = toPin(name, row);
      const point = points.get(pin) ?? {
        pin,
        text: source.kind === "device-status" ? "device status" : describePlace(source, roles),
        members: [],
      };
      point.members.push(member);
      points.set(pin, point);
    }
  }
  return { name, role, fed, points: [...points.values()] };
}

/** The pin at which a row's wire leaves. */
export function toPin(role: string, row: RowContent): string {
  const { source } = row;
  return source.kind === "process-data"
    ? `${role}/${source.direction}/${source.subindex}`
    : `${role}/${JSON.stringify(source)}`;
}

function connect({ id, row }: Member, roles: Roles): Connection[] {
  if (!row || row.source.kind === "formula" || row.source.kind === "constant") return [];
  return listRolesOf(row.source)
    .filter((role) => roles.has(role))
    .map((role) => ({ id: `${role}\n${id}`, pin: toPin(role, row), terminal: id }));
}

/** Members in their groups, in the order of the type; members without a group come first. */
export function groupMembers(members: readonly Member[]): { group: string; members: Member[] }[] {
  const groups = new Map<string, Member[]>();
  for (const member of members) {
    const { group } = member.target;
    groups.set(group, [...(groups.get(group) ?? []), member]);
  }
  return [...groups].map(([group, list]) => ({ group, members: list }));
}

/** The last step of a path; `&` escapes are undone. */
export function nameMember(target: Target): string {
  return target.names.at(-1)?.name ?? target.path;
}

export function countMapped(members: readonly Member[]): { mapped: number; all: number; open: number } {
  const inputs = members.filter((member) => member.row?.direction !== "out");
  const mapped = inputs.filter((member) => member.row !== undefined).length;
  const open = inputs.filter((member) => member.row === undefined && member.target.isMandatory).length;
  return { mapped, all: inputs.length, open };
}

/** Paths of the Variables that rows write to outputs. */
export function listOutputs(members: readonly Member[]): string[] {
  return members.flatMap(({ row, target }) => (row?.direction === "out" ? [target.path] : []));
}
