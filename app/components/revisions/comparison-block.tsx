import { useSearchParams } from "react-router";
import { DifferenceBadge, RatingBadge } from "~/components/notation/difference-badge";
import { TextLink } from "~/components/ui/button";
import { Field, Select } from "~/components/ui/field";
import { Block } from "~/components/ui/page";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { RevisionJson } from "~/utils/api-schemas";
import type { Compared } from "./compared";
import { toDifference } from "./to-difference";

type Change = Compared["changes"][number];

/** The change between two states as an engineer names it, the breaking ones first. */
export function ComparisonBlock({
  modelId,
  revisions,
  compared,
}: {
  modelId: string;
  revisions: readonly RevisionJson[];
  compared: Compared;
}) {
  const { changes, proposedVersion } = compared;
  return (
    <Block title="What changed" actions={<StateChoice revisions={revisions} compared={compared} />}>
      <p className="mb-3 flex flex-wrap items-center gap-x-5 gap-y-1 text-small text-ink-2" role="status">
        {changes.length === 0 ? <span>Nothing changed between these two states.</span> : null}
        {(["breaking", "additive", "neutral"] as const).map((rating) => {
          const count = changes.filter((change) => change.rating === rating).length;
          return count === 0 ? null : <RatingBadge key={rating} rating={rating} count={count} />;
        })}
        {changes.length > 0 && proposedVersion ? (
          <span>
            proposed next version <span className="font-mono text-ink">{proposedVersion}</span>
          </span>
        ) : null}
      </p>
      {changes.length === 0 ? null : (
        <TableScroll label="Changes">
          <Table caption="Changes between the two states">
            <thead>
              <tr>
                <Th className="w-7">
                  <span className="sr-only">Added, removed or changed</span>
                </Th>
                <Th>Where</Th>
                <Th>Change</Th>
                <Th>Before</Th>
                <Th>After</Th>
                <Th>For readers</Th>
                <Th>Why</Th>
              </tr>
            </thead>
            <tbody>
              {changes.map((change, i) => (
                <ChangeRow
                  key={`${change.kind} ${change.nodeId ?? ""} ${change.detail ?? ""} ${i}`}
                  modelId={modelId}
                  change={change}
                />
              ))}
            </tbody>
          </Table>
        </TableScroll>
      )}
    </Block>
  );
}

function ChangeRow({ modelId, change }: { modelId: string; change: Change }) {
  const where = change.path === "" ? "the model" : change.path;
  const isThere = change.nodeId !== null && change.after !== null;
  return (
    <Tr className="align-top">
      <Td className="pt-1.5">
        <DifferenceBadge difference={toDifference(change)} />
      </Td>
      <Td className="py-1.5 font-semibold">
        {isThere ? (
          <TextLink to={`/models/${modelId}/sheet?node=${encodeURIComponent(change.nodeId ?? "")}`}>{where}</TextLink>
        ) : (
          where
        )}
      </Td>
      <Td className="py-1.5 whitespace-nowrap">
        {change.kind.replaceAll("-", " ")}
        {change.detail ? <span className="text-ink-3"> · {change.detail}</span> : null}
      </Td>
      <Td mono className="py-1.5 text-note text-ink-2">
        {change.before ?? ""}
      </Td>
      <Td mono className="py-1.5 text-note">
        {change.after ?? ""}
      </Td>
      <Td className="py-1.5">
        <RatingBadge rating={change.rating} />
      </Td>
      <Td className="py-1.5 text-note text-ink-2">
        {change.reason}
        {change.clause === "" ? null : <span className="block text-ink-3">{change.clause}</span>}
      </Td>
    </Tr>
  );
}

function StateChoice({ revisions, compared }: { revisions: readonly RevisionJson[]; compared: Compared }) {
  const [, setSearch] = useSearchParams();
  const choose = (name: "from" | "to", value: string) =>
    setSearch({ from: String(compared.from), to: String(compared.to), [name]: value }, { preventScrollReset: true });
  const options = (
    <>
      <option value="working">working state</option>
      {revisions.map(({ number, message }) => (
        <option key={number} value={number}>
          {`${number} · ${message.length > 40 ? `${message.slice(0, 39)}…` : message}`}
        </option>
      ))}
    </>
  );
  return (["from", "to"] as const).map((name) => (
    <Field key={name} label={name === "from" ? "From" : "To"} className="flex! items-center gap-2">
      {(control) => (
        <Select
          {...control}
          value={String(compared[name])}
          onChange={(event) => choose(name, event.currentTarget.value)}
          className="w-56"
        >
          {options}
        </Select>
      )}
    </Field>
  ));
}
