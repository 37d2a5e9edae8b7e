import { Hammer, Plus, Trash2 } from "lucide-react";
import { useMemo, useState } from "react";
import { href, useNavigate, useSearchParams } from "react-router";
import { useMappingActions } from "~/components/mapping/use-mapping-actions";
import { describe } from "~/components/model/edit-steps";
import { useEditorState, useOpenModel } from "~/components/model/use-model";
import { Button, LinkButton } from "~/components/ui/button";
import { Drawer } from "~/components/ui/drawer";
import { Empty } from "~/components/ui/empty";
import { Select } from "~/components/ui/field";
import { Page } from "~/components/ui/page";
import { Segments } from "~/components/ui/segments";
import { Table, TableScroll, Td, Th, RowHead } from "~/components/ui/table";
import { showToast } from "~/components/ui/toast";
import type { NodeKey } from "~/domain/address-space/node-id";
import { listTargets } from "~/domain/mapping/list-targets";
import { listParts, readPart } from "~/domain/mapping/mapping-entries";
import { signalStates, type SurveySignal } from "~/domain/mapping/mapping-parts";
import { toRowId } from "~/domain/mapping/type-mapping";
import type { DeviceSummary } from "~/services/read-devices.server";
import { buildSignals } from "./build-signals";
import { SurveyForm } from "./survey-form";
import { SurveyTable } from "./survey-table";
import { countStates, stateWords, type SignalState } from "./survey-words";

type Props = { devices: readonly DeviceSummary[] };

const newSignal: SurveySignal = {
  name: "New signal",
  group: "Process",
  wantedBy: [],
  state: "wanted",
  delivery: { kind: "none", text: "" },
  evidence: [],
};

/** What a machine type should tell, who wants it, what delivers it today or which sensor must be bought. */
export function SurveyView({ devices }: Props) {
  const { space } = useEditorState();
  const { workspace } = useOpenModel();
  const [search, setSearch] = useSearchParams();
  const types = useMemo(() => space.listOwnNodes().filter((node) => node.nodeClass === "ObjectType"), [space]);
  const asked = types.find((node) => node.key === search.get("type"));
  const surveyed = types.find((node) => listParts(space, "signal", node.key).length > 0);
  const type = asked ?? surveyed ?? types[0];
  if (!type)
    return (
      <main id="main" className="grid flex-1 place-content-center p-8">
        <h1 className="sr-only">Signal survey</h1>
        <Empty
          title="No machine type yet"
          action={
            <LinkButton tone="main" to={href("/models/:modelId/register", { modelId: workspace.model.id })}>
              Open the register
            </LinkButton>
          }
        >
          A survey belongs to an ObjectType of this model. Add the machine type first; it may be empty.
        </Empty>
      </main>
    );
  return (
    <TypeSurvey
      key={type.key}
      type={type.key}
      types={types.map((node) => [node.key, node.browseName.name] as const)}
      devices={devices}
      onType={(key) => setSearch({ type: key })}
    />
  );
}

type TypeProps = Props & {
  type: NodeKey;
  types: readonly (readonly [NodeKey, string])[];
  onType: (key: NodeKey) => void;
};

function TypeSurvey({ type, types, devices, onType }: TypeProps) {
  const model = useOpenModel();
  const { space } = useEditorState();
  const actions = useMappingActions(type);
  const navigate = useNavigate();
  const [selected, setSelected] = useState<string | undefined>(undefined);
  const [state, setState] = useState<SignalState | "all">("all");
  const entries = useMemo(() => listParts(space, "signal", type), [space, type]);
  const signals = entries.map((entry) => entry.value);
  const shown = entries.filter((entry) => state === "all" || entry.value.state === state);
  const decided = entries.filter((entry) => entry.value.state === "decided");
  const members = useMemo(
    () =>
      new Map(
        listTargets(space, type).flatMap((target) =>
          [target.target, ...target.aliases].map(
            (name) =>
              [name, { target, isFed: readPart(space, "row", type, toRowId(target.target)) !== undefined }] as const,
          ),
        ),
      ),
    [space, type],
  );
  const open = entries.find((entry) => entry.id === selected);
  const typeName = types.find(([key]) => key === type)?.[1] ?? "";

  function add(): void {
    const id = `signal-${crypto.randomUUID()}`;
    if (actions.set("add-signal", "signal", id, newSignal)) setSelected(id);
  }
  function build(): void {
    const result = buildSignals(space, model.editor.allocator, type, decided);
    const saved = result.ok ? model.editor.dispatch("build-signals", result.value.operations) : result;
    if (!result.ok || !saved.ok) {
      showToast({
        tone: "error",
        title: "The signals could not be built",
        detail: describe(space, saved.problems).join(" "),
        seconds: 15,
      });
      return;
    }
    showToast({
      tone: "good",
      title: `${result.value.built.length} ${result.value.built.length === 1 ? "signal is a member" : "signals are members"} now`,
      detail: "Undo takes them back in one step.",
      action: (
        <Button
          size="small"
          onClick={() => void navigate(href("/models/:modelId/mapping", { modelId: model.workspace.model.id }))}
        >
          Map them
        </Button>
      ),
      seconds: 12,
    });
  }
  const buildBlockedBy = !model.actions.canEdit
    ? "asks for the role engineer or administrator"
    : decided.length === 0
      ? "no signal is decided"
      : undefined;

  return (
    <Page
      title="Signal survey"
      about={
        types.length > 1 ? (
          <Select
            aria-label="Machine type"
            className="w-56! italic"
            value={type}
            onChange={(event) => onType(event.currentTarget.value as NodeKey)}
          >
            {types.map(([key, name]) => (
              <option key={key} value={key}>
                {name}
              </option>
            ))}
          </Select>
        ) : (
          <em>{typeName}</em>
        )
      }
      actions={
        <>
          <Button icon={Hammer} blockedBy={buildBlockedBy} onClick={build}>
            Build {decided.length} decided
          </Button>
          <Button icon={Plus} tone="main" blockedBy={actions.blockedBy} onClick={add}>
            Signal
          </Button>
        </>
      }
      foot={
        open ? (
          <Drawer
            label={`Signal ${open.value.name}`}
            storageKey="survey-drawer"
            initialHeight={320}
            onClose={() => setSelected(undefined)}
            head={<h2 className="text-small font-semibold">{open.value.name}</h2>}
            tools={
              <Button
                size="small"
                tone="bare"
                icon={Trash2}
                blockedBy={actions.blockedBy}
                onClick={() => {
                  if (actions.set("remove-signal", "signal", open.id, undefined)) setSelected(undefined);
                }}
              >
                Remove
              </Button>
            }
          >
            <SurveyForm
              key={open.id}
              signal={open.value}
              signals={signals}
              devices={devices}
              isBlocked={actions.blockedBy !== undefined}
              onChange={(next) => void actions.set("set-signal", "signal", open.id, next)}
            />
          </Drawer>
        ) : undefined
      }
    >
      {entries.length === 0 ? (
        <Empty
          title="No signal surveyed yet"
          action={
            <Button icon={Plus} blockedBy={actions.blockedBy} onClick={add}>
              Add the first signal
            </Button>
          }
        >
          Write down what the machine should tell and who wants it, before anything is modelled. What is decided becomes
          a member of the type, and then gets its source.
        </Empty>
      ) : (
        <div className="grid gap-5">
          <StateMatrix signals={signals} />
          <Segments
            label="State"
            className="justify-self-start"
            value={state}
            onChange={setState}
            options={[
              { value: "all", label: <>All {entries.length}</> },
              ...signalStates.map((one) => ({
                value: one,
                label: (
                  <>
                    {stateWords[one]} {signals.filter((signal) => signal.state === one).length}
                  </>
                ),
              })),
            ]}
          />
          <SurveyTable
            entries={shown}
            selected={selected}
            members={members}
            onSelect={(id) => setSelected(id === selected ? undefined : id)}
          />
        </div>
      )}
    </Page>
  );
}

/** Groups against states: where the work stands. */
function StateMatrix({ signals }: { signals: readonly SurveySignal[] }) {
  return (
    <TableScroll label="Where the survey stands" className="max-w-180">
      <Table caption="Signals by group and state">
        <thead>
          <tr>
            <Th>Group</Th>
            {signalStates.map((state) => (
              <Th key={state} right>
                {stateWords[state]}
              </Th>
            ))}
            <Th right>All</Th>
            <Th className="w-40">
              <span className="sr-only">Part that is built</span>
            </Th>
          </tr>
        </thead>
        <tbody>
          {countStates(signals).map(({ group, counts, all }) => (
            <tr key={group}>
              <RowHead>{group || "without a group"}</RowHead>
              {signalStates.map((state) => (
                <Td key={state} right mono className={counts[state] === 0 ? "text-ink-3" : undefined}>
                  {counts[state]}
                </Td>
              ))}
              <Td right mono className="font-semibold">
                {all}
              </Td>
              <Td>
                <Tape built={counts.built} decided={counts.decided} all={all - counts.dropped} />
              </Td>
            </tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}

/** A tape divided into signals: built ones full, decided ones framed, the rest hatched. */
function Tape({ built, decided, all }: { built: number; decided: number; all: number }) {
  return (
    <span role="img" aria-label={`${built} of ${all} built, ${decided} decided`} className="flex h-3 border border-ink">
      {Array.from({ length: all }, (_, i) => (
        <span
          key={i}
          className={`flex-1 border-r border-leaf last:border-r-0 ${i < built ? "bg-ink-2" : i < built + decided ? "bg-leaf" : "hatch"}`}
        />
      ))}
    </span>
  );
}
