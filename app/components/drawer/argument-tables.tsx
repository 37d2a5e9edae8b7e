import { Plus, X } from "lucide-react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { MethodNode } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { listArguments, type ArgumentFacts, type Direction } from "../model/method-arguments";
import { formatValueRank } from "../model/member-facts";
import { TypeField } from "../model/type-search";
import { useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { Select } from "../ui/field";
import { CommitField } from "./particular";

/** The arguments that a Method takes and answers, as two small tables. */
export function ArgumentTables({ space, node, readOnly }: { space: AddressSpace; node: MethodNode; readOnly: boolean }) {
  return (
    <section aria-label="Arguments">
      <ArgumentTable space={space} method={node.key} direction="input" title="Input arguments" readOnly={readOnly} />
      <div className="h-3" />
      <ArgumentTable space={space} method={node.key} direction="output" title="Output arguments" readOnly={readOnly} />
    </section>
  );
}

type TableProps = { space: AddressSpace; method: NodeKey; direction: Direction; title: string; readOnly: boolean };

function ArgumentTable({ space, method, direction, title, readOnly }: TableProps) {
  const { actions } = useOpenModel();
  const list = listArguments(space, method, direction);

  function change(index: number, part: Partial<ArgumentFacts> | undefined): void {
    const next = list.flatMap((argument, i) => (i !== index ? [argument] : part ? [{ ...argument, ...part }] : []));
    actions.setArguments(method, direction, next);
  }

  function add(): void {
    const name = direction === "input" ? "Argument" : "Result";
    const taken = new Set(list.map((argument) => argument.name));
    let free = name;
    for (let i = 2; taken.has(free); i++) free = `${name}${i}`;
    actions.setArguments(method, direction, [...list, { name: free, dataType: StandardDataType.Double, valueRank: -1, description: "" }]);
  }

  return (
    <>
      <h3>
        {title} <span className="font-mono font-normal">{list.length}</span>
      </h3>
      {list.length === 0 ? null : (
        <table className="small-table" aria-label={title}>
          <colgroup>
            <col className="w-[26%]" />
            <col className="w-[25%]" />
            <col className="w-[18%]" />
            <col />
            <col className="w-7" />
          </colgroup>
          <thead>
            <tr>
              <th scope="col">Name</th>
              <th scope="col">DataType</th>
              <th scope="col">Rank</th>
              <th scope="col">Description</th>
              <th scope="col">
                <span className="sr-only">Remove</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {list.map((argument, index) => (
              <tr key={index}>
                <td>
                  <CommitField isBare label={`Name of argument ${index + 1}`} mono value={argument.name} readOnly={readOnly} onCommit={(name) => change(index, { name })} />
                </td>
                <td>
                  <TypeField label={`DataType of ${argument.name}`} space={space} kind="DataType" value={argument.dataType} readOnly={readOnly} onPick={(dataType) => change(index, { dataType })} />
                </td>
                <td>
                  <Select size="small" aria-label={`Rank of ${argument.name}`} value={argument.valueRank} disabled={readOnly} onChange={(event) => change(index, { valueRank: Number(event.currentTarget.value) })}>
                    {[...new Set([-1, 1, argument.valueRank])].map((rank) => (
                      <option key={rank} value={rank}>
                        {formatValueRank(rank)}
                      </option>
                    ))}
                  </Select>
                </td>
                <td>
                  <CommitField isBare label={`Description of ${argument.name}`} value={argument.description} readOnly={readOnly} onCommit={(description) => change(index, { description })} />
                </td>
                <td>
                  {readOnly ? null : (
                    <button type="button" aria-label={`Remove argument ${argument.name}`} className="text-ink-3 hover:text-error" onClick={() => change(index, undefined)}>
                      <X size={12} aria-hidden />
                    </button>
                  )}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      {readOnly ? null : (
        <Button size="small" tone="bare" icon={Plus} className="mt-1 -ml-1.5" onClick={add}>
          {direction === "input" ? "Input argument" : "Output argument"}
        </Button>
      )}
    </>
  );
}
