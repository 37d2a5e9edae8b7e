import type { AddressSpace } from "~/domain/address-space/address-space";
import type { MethodNode } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { listArguments, type ArgumentFacts, type Direction } from "../model/method-arguments";
import { formatValueRank } from "../model/member-facts";
import { TypeField } from "../model/type-search";
import { useOpenModel } from "../model/use-model";
import { Select } from "../ui/field";
import { withMoved } from "../values/value-draft";
import { CommitField } from "./particular";
import { SmallTable } from "./small-table";

/** The arguments that a Method takes and answers, as two small tables. */
export function ArgumentTables({
  space,
  node,
  readOnly,
}: {
  space: AddressSpace;
  node: MethodNode;
  readOnly: boolean;
}) {
  return (
    <section aria-label="Arguments">
      <ArgumentTable space={space} method={node.key} direction="input" title="Input arguments" readOnly={readOnly} />
      <div className="h-3" />
      <ArgumentTable space={space} method={node.key} direction="output" title="Output arguments" readOnly={readOnly} />
    </section>
  );
}

type TableProps = { space: AddressSpace; method: NodeKey; direction: Direction; title: string; readOnly: boolean };

const COLUMNS = [
  { title: "Name", width: "24%" },
  { title: "DataType", width: "25%" },
  { title: "Rank", width: "18%" },
  { title: "Description" },
];

function ArgumentTable({ space, method, direction, title, readOnly }: TableProps) {
  const { actions } = useOpenModel();
  const list = listArguments(space, method, direction);
  const set = (next: readonly ArgumentFacts[]): void => actions.setArguments(method, direction, next);
  const change = (index: number, part: Partial<ArgumentFacts>): void =>
    set(list.map((argument, i) => (i === index ? { ...argument, ...part } : argument)));

  function add(): void {
    const name = direction === "input" ? "Argument" : "Result";
    set([
      ...list,
      {
        name: findFreeName(
          name,
          list.map((argument) => argument.name),
        ),
        dataType: StandardDataType.Double,
        valueRank: -1,
        description: "",
      },
    ]);
  }

  return (
    <SmallTable
      title={title}
      columns={COLUMNS}
      rows={list}
      readOnly={readOnly}
      nameOf={(argument) => `argument ${argument.name}`}
      addLabel={direction === "input" ? "Input argument" : "Output argument"}
      onAdd={add}
      onRemove={(index) => set(list.filter((_, i) => i !== index))}
      onMove={(index, by) => set(withMoved(list, index, by))}
      cells={(argument, index) => [
        <CommitField
          isBare
          label={`Name of argument ${index + 1}`}
          mono
          value={argument.name}
          readOnly={readOnly}
          onCommit={(name) => change(index, { name })}
        />,
        <TypeField
          label={`DataType of ${argument.name}`}
          space={space}
          kind="DataType"
          value={argument.dataType}
          readOnly={readOnly}
          onPick={(dataType) => change(index, { dataType })}
        />,
        <Select
          size="small"
          aria-label={`Rank of ${argument.name}`}
          value={argument.valueRank}
          disabled={readOnly}
          onChange={(event) => change(index, { valueRank: Number(event.currentTarget.value) })}
        >
          {[...new Set([-1, 1, 2, 3, argument.valueRank])].map((rank) => (
            <option key={rank} value={rank}>
              {formatValueRank(rank)}
            </option>
          ))}
        </Select>,
        <CommitField
          isBare
          label={`Description of ${argument.name}`}
          value={argument.description}
          readOnly={readOnly}
          onCommit={(description) => change(index, { description })}
        />,
      ]}
    />
  );
}

/** The name itself, or with the next number behind it. */
export function findFreeName(name: string, taken: readonly string[]): string {
  let free = name;
  for (let i = 2; taken.includes(free); i++) free = `${name}${i}`;
  return free;
}
