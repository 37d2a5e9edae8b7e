import { Plus, X } from "lucide-react";
import { useMemo, useState } from "react";
import { useOpenModel, useSpace, type OpenModel } from "~/components/model/use-model";
import { Button, IconButton } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Drawer } from "~/components/ui/drawer";
import { Checkbox } from "~/components/ui/field";
import { Block } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th } from "~/components/ui/table";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Machine } from "~/domain/instantiation/list-machines";
import { findMappedType, listExceptions } from "~/domain/mapping/bindings";
import { readPart } from "~/domain/mapping/mapping-entries";
import type { RowContent } from "~/domain/mapping/mapping";
import type { RowException } from "~/domain/mapping/mapping-parts";
import { Choice } from "./choice";
import { CommitInput } from "./commit-input";
import { makeMappingScene } from "./mapping-scene";
import { RowInspector } from "./row-inspector";
import { MappingActions } from "./use-mapping-actions";

/** Edits of a row land in the machine's exception, not in the type. */
class ExceptionActions extends MappingActions {
  readonly #exception: RowException;
  readonly #id: string;

  constructor(model: OpenModel, machine: NodeKey, id: string, exception: RowException) {
    super(model, machine);
    this.#id = id;
    this.#exception = exception;
  }

  override setRow(_id: string, row: RowContent): boolean {
    const { isMissing: _missing, ...rest } = this.#exception;
    return this.set("set-exception", "exception", this.#id, { ...rest, row });
  }
}

type Place = { readonly machine: NodeKey; readonly id: string };

/** Machines that differ from their type in a row: visible in one table, and changed there. */
export function Exceptions({ machines }: { machines: readonly Machine[] }) {
  const model = useOpenModel();
  const space = useSpace();
  const [open, setOpen] = useState<Place | undefined>(undefined);
  const [isAdding, setAdding] = useState(false);
  const exceptions = useMemo(
    () => machines.flatMap((machine) => listExceptions(space, machine.key).map((one) => ({ machine, ...one }))),
    [machines, space],
  );
  const blockedBy = model.workspace.permissions.includes("mapping.edit")
    ? undefined
    : "asks for the role integrator, engineer or administrator";
  return (
    <Block
      title="Exceptions"
      about="Machines that differ from their type in a row."
      actions={
        <Button
          size="small"
          icon={Plus}
          blockedBy={blockedBy}
          aria-expanded={isAdding}
          onClick={() => setAdding(!isAdding)}
        >
          Exception
        </Button>
      }
    >
      {isAdding ? (
        <AddException
          machines={machines}
          onAdd={(place) => {
            if (
              new MappingActions(model, place.machine).set("set-exception", "exception", place.id, {
                reason: "Differs from its type",
                isMissing: true,
              })
            ) {
              setOpen(place);
              setAdding(false);
            }
          }}
        />
      ) : null}
      {exceptions.length === 0 ? (
        <p className="text-small text-ink-2">None: every machine is fed as its type says.</p>
      ) : (
        <TableScroll label="Exceptions">
          <Table caption="Rows in which machines differ from their type">
            <thead>
              <tr>
                <Th>Machine</Th>
                <Th>Member</Th>
                <Th>Differs by</Th>
                <Th>Reason</Th>
                <Th>
                  <span className="sr-only">Actions</span>
                </Th>
              </tr>
            </thead>
            <tbody>
              {exceptions.map(({ machine, target, path, exception }) => {
                const isOpen = open?.machine === machine.key && open.id === target;
                return (
                  <tr key={`${machine.key} ${path}`} className={cx(isOpen ? "bg-copper-wash" : "hover:bg-bench")}>
                    <RowHead className="p-0!">
                      <button
                        type="button"
                        aria-label={`${machine.name} ${path}`}
                        aria-expanded={isOpen}
                        onClick={() => setOpen(isOpen ? undefined : { machine: machine.key, id: target })}
                        className="h-7 w-full pl-2 text-left font-semibold focus-visible:-outline-offset-2"
                      >
                        {machine.name}
                      </button>
                    </RowHead>
                    <Td mono>{path}</Td>
                    <Td>
                      {exception.isMissing ? "is not there" : `another ${Object.keys(exception.row ?? {}).join(", ")}`}
                    </Td>
                    <Td className="text-ink-2">{exception.reason}</Td>
                    <Td right>
                      <IconButton
                        icon={X}
                        size="small"
                        label={`Remove the exception of ${machine.name} in ${path}`}
                        {...(blockedBy === undefined ? {} : { blockedBy })}
                        onClick={() =>
                          new MappingActions(model, machine.key).set("remove-exception", "exception", target, undefined)
                        }
                      />
                    </Td>
                  </tr>
                );
              })}
            </tbody>
          </Table>
        </TableScroll>
      )}
      {open ? (
        <OpenException
          key={`${open.machine} ${open.id}`}
          place={open}
          machine={machines.find((one) => one.key === open.machine)}
          onClose={() => setOpen(undefined)}
        />
      ) : null}
    </Block>
  );
}

function AddException({ machines, onAdd }: { machines: readonly Machine[]; onAdd: (place: Place) => void }) {
  const space = useSpace();
  const [machine, setMachine] = useState<NodeKey | undefined>(machines[0]?.key);
  const type = machine === undefined ? undefined : findMappedType(space, machine);
  const rows = useMemo(
    () => (type === undefined ? [] : makeMappingScene(space, type).members.filter((member) => member.row)),
    [space, type],
  );
  const [id, setId] = useState(rows[0]?.id ?? "");
  return (
    <div className="mb-3 flex flex-wrap items-end gap-3 border border-rule bg-bench p-3">
      <Choice
        label="Machine"
        value={machine ?? ""}
        options={machines.map((one) => [one.key, one.name] as const)}
        onChange={(key) => setMachine(key as NodeKey)}
      />
      <Choice
        label="Member"
        value={id}
        options={rows.map((member) => [member.id, member.target.path] as const)}
        onChange={setId}
      />
      <Button size="small" onClick={() => machine !== undefined && id !== "" && onAdd({ machine, id })}>
        Let it differ
      </Button>
    </div>
  );
}

function OpenException({
  place,
  machine,
  onClose,
}: {
  place: Place;
  machine: Machine | undefined;
  onClose: () => void;
}) {
  const model = useOpenModel();
  const space = useSpace();
  const type = findMappedType(space, place.machine);
  const scene = useMemo(() => (type === undefined ? undefined : makeMappingScene(space, type)), [space, type]);
  const exception = readPart(space, "exception", place.machine, place.id);
  const member = scene?.members.find(
    (one) => one.id === place.id || one.target.target === place.id || one.target.aliases.includes(place.id),
  );
  if (!exception || !member || !scene || !machine) return null;
  const actions = new ExceptionActions(model, place.machine, place.id, exception);
  const row = member.row && ({ ...member.row, ...exception.row } as RowContent);
  const save = (next: RowException) => actions.set("set-exception", "exception", place.id, next);
  return (
    <Drawer
      label={`Exception of ${machine.name} in ${member.target.path}`}
      storageKey="exception-drawer"
      initialHeight={380}
      className="mt-4 border-b border-rule"
      onClose={onClose}
      head={
        <h3 className="text-small font-semibold">
          {machine.name} <span className="font-normal text-ink-2">differs in</span> {member.target.path}
        </h3>
      }
    >
      <div className="grid grid-cols-[minmax(0,1fr)_auto] items-end gap-4 px-5 pt-3">
        <CommitInput
          label="Reason"
          value={exception.reason}
          onCommit={(text) => {
            if (text.trim() === "") return "a reason is needed";
            save({ ...exception, reason: text.trim() });
            return undefined;
          }}
        />
        <Checkbox
          className="pb-1"
          label="This machine does not have it"
          checked={exception.isMissing === true}
          disabled={actions.blockedBy !== undefined}
          onChange={(event) => {
            const { isMissing: _old, ...rest } = exception;
            save(event.currentTarget.checked ? { ...rest, isMissing: true } : rest);
          }}
        />
      </div>
      {exception.isMissing || !row ? null : (
        <RowInspector
          member={{ ...member, row }}
          members={scene.members}
          roles={scene.roles}
          reading={undefined}
          findings={[]}
          actions={actions}
        />
      )}
    </Drawer>
  );
}
