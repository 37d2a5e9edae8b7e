import { LayoutGrid } from "lucide-react";
import { Form } from "react-router";
import type { BoardsPage } from "~/services/watch-boards.server";
import { LocalTime } from "../shell/local-time";
import { Button, LinkButton } from "../ui/button";
import { Empty } from "../ui/empty";
import { Notice } from "../ui/notice";
import { Block, Page } from "../ui/page";
import { Table, TableScroll, Td, Th, Tr } from "../ui/table";

type Props = BoardsPage & { mayMake: boolean; errors: readonly string[] };

/** Boards of the organisation, and the machine types that have none yet. */
export function BoardsView({ boards, offers, mayMake, errors }: Props) {
  const open = offers.filter((offer) => offer.boardId === null);
  return (
    <Page title="Watch boards" about="Live values of a machine type, the same board for each of its machines.">
      {errors.length > 0 ? <Notice tone="error" live title={errors.join(" ")} className="mb-3" /> : null}
      {boards.length > 0 ? (
        <Block title="Boards" className="mb-8">
          <TableScroll label="Watch boards">
            <Table caption="Watch boards">
              <thead>
                <tr>
                  <Th>Board</Th>
                  <Th>Model</Th>
                  <Th right>Machines</Th>
                  <Th right>Tiles</Th>
                  <Th>Last arranged</Th>
                  <Th>
                    <span className="sr-only">Open or remove</span>
                  </Th>
                </tr>
              </thead>
              <tbody>
                {boards.map((board) => (
                  <Tr key={board.id}>
                    <Td className="font-semibold">{board.name}</Td>
                    <Td>{board.modelName}</Td>
                    <Td right mono>
                      {board.machines}
                    </Td>
                    <Td right mono>
                      {board.tiles}
                    </Td>
                    <Td className="text-ink-2">
                      <LocalTime iso={board.updatedAt} />, {board.updatedBy}
                    </Td>
                    <Td right>
                      <span className="flex justify-end gap-2">
                        {mayMake ? (
                          <Form method="post">
                            <input type="hidden" name="intent" value="remove" />
                            <input type="hidden" name="id" value={board.id} />
                            <Button type="submit" size="small" aria-label={`Remove the board ${board.name}`}>
                              Remove
                            </Button>
                          </Form>
                        ) : null}
                        <LinkButton size="small" tone="ink" to={`/boards/${board.id}`} aria-label={`Open the board ${board.name}`}>
                          Open
                        </LinkButton>
                      </span>
                    </Td>
                  </Tr>
                ))}
              </tbody>
            </Table>
          </TableScroll>
        </Block>
      ) : null}
      {open.length > 0 ? (
        <Empty title={boards.length === 0 ? "No board yet" : "Types without a board"}>
          <p>A board is made of one machine in a press: analog values as bars, states as lamps, counters, trends.</p>
          <ul className="mt-3 grid justify-items-center gap-2">
            {open.map((offer) => (
              <li key={`${offer.modelId} ${offer.machineNodeId}`}>
                <MakeBoardButton modelId={offer.modelId} machine={offer.machineNodeId} label={`Make a board of ${offer.typeName} (${offer.modelName})`} mayMake={mayMake} isMain={boards.length === 0} />
              </li>
            ))}
          </ul>
        </Empty>
      ) : boards.length === 0 ? (
        <Empty title="No machines yet">
          <p>Roll out machines in a model of kind machines first; each of their types then has a board.</p>
        </Empty>
      ) : null}
    </Page>
  );
}

export function MakeBoardButton({ modelId, machine, label, mayMake, isMain }: { modelId: string; machine: string; label: string; mayMake: boolean; isMain?: boolean }) {
  return (
    <Form method="post" action="/boards">
      <input type="hidden" name="intent" value="open" />
      <input type="hidden" name="modelId" value={modelId} />
      <input type="hidden" name="machine" value={machine} />
      <Button type="submit" icon={LayoutGrid} tone={isMain ? "main" : "plain"} blockedBy={mayMake ? undefined : "Your roles do not make boards"}>
        {label}
      </Button>
    </Form>
  );
}
