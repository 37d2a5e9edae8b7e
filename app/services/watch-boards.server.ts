/** Boards: made of a machine in one press, arranged by hand, opened on any machine of the type. */
import { z } from "zod";
import { assertMay, type Caller } from "../auth/caller.server";
import type { Action } from "../auth/permissions";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { listEndpoints } from "../db/repositories/endpoints.server";
import { findModel, listModels } from "../db/repositories/models.server";
import {
  addWatchBoardStatement,
  changeWatchBoardStatement,
  findBoardOfType,
  findWatchBoard,
  listWatchBoards,
  removeWatchBoardStatement,
  type WatchBoardRow,
} from "../db/repositories/watch-boards.server";
import { findTypeDefinition, getDisplayName } from "../domain/address-space/browse";
import { formatNodeId, parseNodeId } from "../domain/address-space/node-id";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { listMachines } from "../domain/instantiation/list-machines";
import { boardContentSchema, isOfType, makeBoard, resolveBoard, type BoardContent } from "../domain/live/watch-board";
import { getSupervisor } from "../opcua/supervisor.server";
import { newId } from "../utils/ids.server";
import { loadWorkingModel } from "./working-model.server";

export const boardChangeSchema = z.strictObject({
  name: z.string().trim().min(1).max(100),
  content: boardContentSchema,
  /** The version that was changed. */
  version: z.number().int().min(1),
});

export type BoardSummary = { readonly id: string; readonly name: string; readonly modelName: string; readonly machines: number; readonly tiles: number; readonly updatedAt: string; readonly updatedBy: string };
/** A machine that a board could be made of, one for each type. */
export type BoardOffer = { readonly modelId: string; readonly machineNodeId: string; readonly typeName: string; readonly modelName: string; readonly boardId: string | null };
export type BoardsPage = { readonly boards: readonly BoardSummary[]; readonly offers: readonly BoardOffer[] };

export async function readBoardsPage(organizationId: string): Promise<BoardsPage> {
  const rows = await listWatchBoards(organizationId);
  const boards: BoardSummary[] = [];
  const offers: BoardOffer[] = [];
  for (const model of await listModels(organizationId)) {
    if (model.kind !== "machines") continue;
    const space = (await loadWorkingModel(model.id))?.space;
    if (!space) continue;
    const machines = listMachines(space).flatMap((machine) => {
      const type = machine.typeKey === undefined ? undefined : space.getNode(machine.typeKey);
      return type ? [{ ...machine, typeNodeId: formatNodeId(type.nodeId) }] : [];
    });
    for (const row of rows.filter((board) => board.modelId === model.id)) {
      const content = readContent(row);
      const { id, name, updatedAt, updatedBy } = row;
      boards.push({ id, name, modelName: model.name, machines: machines.filter((m) => m.typeNodeId === row.typeNodeId).length, tiles: content.tiles.filter((t) => !t.isHidden).length, updatedAt: updatedAt.toISOString(), updatedBy });
    }
    for (const [typeNodeId, machine] of new Map(machines.toReversed().map((m) => [m.typeNodeId, m]))) {
      const board = rows.find((row) => row.modelId === model.id && row.typeNodeId === typeNodeId);
      offers.push({ modelId: model.id, machineNodeId: machine.nodeId, typeName: machine.typeName, modelName: model.name, boardId: board?.id ?? null });
    }
  }
  return { boards, offers };
}

/** The board of a machine's type; made when there is none. Problem: `board.no-machine`. */
export async function openBoardOf(author: Caller, modelId: string, machineNodeId: string): Promise<Result<{ id: string }>> {
  const model = await findModel(modelId);
  const space = model && (await loadWorkingModel(model.id))?.space;
  const parsed = parseNodeId(machineNodeId, []);
  const machine = parsed.ok ? space?.findByNodeId(parsed.value) : undefined;
  const type = machine && space ? findTypeDefinition(space, machine.key) : undefined;
  const typeNode = type === undefined ? undefined : space?.getNode(type);
  if (!model || !space || machine?.nodeClass !== "Object" || !typeNode) return fail(problem("board.no-machine", { nodeId: machineNodeId }));
  const typeNodeId = formatNodeId(typeNode.nodeId);
  const known = await findBoardOfType(model.id, typeNodeId);
  if (known) return ok({ id: known.id });
  const id = newId();
  const name = getDisplayName(typeNode);
  await writeBatch([
    addWatchBoardStatement({ id, organizationId: model.organizationId, modelId: model.id, name, typeNodeId, content: makeBoard(space, machine.key), version: 1, updatedBy: author.name, updatedAt: new Date() }),
    addAuditStatement({ organizationId: model.organizationId, userId: author.userId, userName: author.name, action: "board.make", subject: { kind: "board", id, name } }),
  ]);
  return ok({ id });
}

export async function requireBoard(caller: Caller, id: string | undefined, action: Action): Promise<WatchBoardRow> {
  const row = id === undefined ? undefined : await findWatchBoard(id);
  assertMay(caller, action, row?.organizationId);
  return row as WatchBoardRow;
}

/** Problem: `board.stale` when somebody else changed it meanwhile. */
export async function changeBoard(author: Caller, row: WatchBoardRow, { name, content, version }: z.infer<typeof boardChangeSchema>): Promise<Result<{ version: number }>> {
  if (version !== row.version) return fail(problem("board.stale", { by: row.updatedBy }));
  await writeBatch([changeWatchBoardStatement(row.id, { name, content, version: version + 1, updatedBy: author.name, updatedAt: new Date() })]);
  return ok({ version: version + 1 });
}

export async function removeBoard(author: Caller, row: WatchBoardRow): Promise<void> {
  await writeBatch([
    removeWatchBoardStatement(row.id),
    addAuditStatement({ organizationId: row.organizationId, userId: author.userId, userName: author.name, action: "board.remove", subject: { kind: "board", id: row.id, name: row.name } }),
  ]);
}

export type BoardTarget = { readonly id: string; readonly name: string; readonly isTestServer: boolean };

export type BoardPage = {
  readonly id: string;
  readonly modelId: string;
  readonly name: string;
  readonly version: number;
  readonly content: BoardContent;
  readonly machines: readonly { readonly nodeId: string; readonly name: string }[];
  readonly machine: string | null;
  /** NodeId text by the path of the tile, at the machine. */
  readonly nodeIds: Readonly<Record<string, string>>;
  readonly targets: readonly BoardTarget[];
  readonly target: BoardTarget | null;
};

/** A board on one machine and one server; without a choice the first machine, and a running test server of the model before endpoints. */
export async function readBoardPage(row: WatchBoardRow, choice: { machine: string | null; target: string | null }): Promise<BoardPage> {
  const space = (await loadWorkingModel(row.modelId))?.space;
  const content = readContent(row);
  const machines = space ? listMachines(space).filter((machine) => isOfType(space, space.requireNode(machine.key), row.typeNodeId)) : [];
  const machine = machines.find((m) => m.nodeId === choice.machine) ?? machines[0];
  const targets = await listTargets(row);
  return {
    id: row.id,
    modelId: row.modelId,
    name: row.name,
    version: row.version,
    content,
    machines: machines.map(({ nodeId, name }) => ({ nodeId, name })),
    machine: machine?.nodeId ?? null,
    nodeIds: space && machine ? resolveBoard(space, machine.key, content) : {},
    targets,
    target: targets.find((t) => t.id === choice.target) ?? targets[0] ?? null,
  };
}

async function listTargets(row: WatchBoardRow): Promise<BoardTarget[]> {
  const servers = getSupervisor()
    .list()
    .filter((server) => server.organizationId === row.organizationId && server.modelId === row.modelId && server.state === "running")
    .reverse();
  const endpoints = await listEndpoints(row.organizationId);
  return [
    ...servers.map(({ id }, i) => ({ id, name: i === 0 ? "Test server" : `Test server ${i + 1}`, isTestServer: true })),
    ...endpoints.map(({ id, name }) => ({ id, name, isTestServer: false })),
  ];
}

function readContent(row: WatchBoardRow): BoardContent {
  const parsed = boardContentSchema.safeParse(row.content);
  return parsed.success ? parsed.data : { tiles: [] };
}
