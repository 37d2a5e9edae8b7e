import { useMemo, useState, useSyncExternalStore } from "react";
import { href, useSearchParams } from "react-router";
import { useEditorState, useOpenModel } from "~/components/model/use-model";
import { LinkButton, Button } from "~/components/ui/button";
import { Drawer } from "~/components/ui/drawer";
import { Empty } from "~/components/ui/empty";
import { Select } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { useSearchState } from "~/components/shell/use-search-state";
import { Segments } from "~/components/ui/segments";
import type { NodeKey } from "~/domain/address-space/node-id";
import { listMachineTypes } from "~/domain/mapping/list-targets";
import { suggestRows, type Suggestion } from "~/domain/mapping/suggest-rows";
import type { DeviceSummary } from "~/services/read-devices.server";
import type { SourceView } from "~/services/read-sources.server";
import { AddOutput } from "./add-output";
import { Bench } from "./bench";
import { useBench } from "./use-bench";
import { useTags } from "./use-tags";
import { DeliverPanel } from "./deliver-panel";
import { countMapped, listOutputs, makeMappingScene } from "./mapping-scene";
import { OpenRow } from "./open-row";
import { RowHead, RowInspector, UnmapButton } from "./row-inspector";
import { SuggestionList } from "./suggestion-list";
import { TagChoice } from "./tag-choice";
import { useMappingActions } from "./use-mapping-actions";
import { WireMap } from "./wire-map";

type Props = { devices: readonly DeviceSummary[]; sources: readonly SourceView[] };
type View = "wires" | "bench" | "deliver";

/** The mapping of a model of types: what feeds what, tried on bytes, handed to gateways. */
export function MappingView({ devices, sources }: Props) {
  const { space } = useEditorState();
  const [search, setSearch] = useSearchParams();
  const types = useMemo(() => listMachineTypes(space), [space]);
  const asked = search.get("type");
  const type = types.find((node) => node.key === asked) ?? types[0];
  if (!type) return <NoType />;
  return (
    <TypeMapping
      key={type.key}
      type={type.key}
      typeName={type.browseName.name}
      types={types.map((node) => [node.key, node.browseName.name] as const)}
      devices={devices}
      sources={sources}
      onType={(key) => setSearch({ type: key })}
    />
  );
}

function NoType() {
  const { workspace } = useOpenModel();
  return (
    <main id="main" className="grid flex-1 place-content-center p-8">
      <h1 className="sr-only">Mapping</h1>
      <Empty
        title="No machine type with Variables yet"
        action={
          <LinkButton tone="main" to={href("/models/:modelId/register", { modelId: workspace.model.id })}>
            Open the register
          </LinkButton>
        }
      >
        A mapping feeds the Variables of an ObjectType. Give the model a type first, or take one in from a signal list.
      </Empty>
    </main>
  );
}

type TypeProps = Props & {
  type: NodeKey;
  typeName: string;
  types: readonly (readonly [NodeKey, string])[];
  onType: (key: NodeKey) => void;
};

function TypeMapping({ type, typeName, types, devices, sources, onType }: TypeProps) {
  const model = useOpenModel();
  const { space } = useEditorState();
  const actions = useMappingActions(type);
  const search = useSearchState();
  const scene = useMemo(() => makeMappingScene(space, type), [space, type]);
  const [refused, setRefused] = useState<ReadonlySet<string>>(new Set());
  const [isSuggesting, setSuggesting] = useState(false);
  const roleTags = useTags();
  const found = useMemo(() => suggestRows(space, type, { tags: roleTags.tags }), [space, type, roleTags.tags]);
  const suggestions = found.filter((suggestion) => !refused.has(nameSuggestion(suggestion)));
  const bench = useBench(space, scene);
  const view = (search.get("view") ?? "wires") as View;
  const selected = search.get("target");
  const member = scene.members.find((one) => one.id === selected);
  const findings = useSyncExternalStore(
    model.findings.subscribe,
    model.findings.getState,
    model.findings.getState,
  ).byNode;
  const { mapped, all, open } = countMapped(scene.members);

  const show = search.set;
  const accept = (list: readonly Suggestion[]) =>
    actions.dispatch(
      "accept-suggestions",
      list.map((suggestion) => ({
        kind: "setMapping",
        part: "row",
        owner: type,
        id: suggestion.target,
        value: { source: suggestion.source, transforms: [...suggestion.transforms], period: 500 },
      })),
    );
  const refuse = (suggestion: Suggestion) => setRefused(new Set([...refused, nameSuggestion(suggestion)]));

  return (
    <>
      <section aria-label="Mapping tools" className="flex h-11 shrink-0 items-center gap-4 border-b border-hair px-5">
        <h1 className="flex items-center gap-2 text-lead">
          {types.length > 1 ? (
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
            <em className="font-semibold">{typeName}</em>
          )}
          <span className="text-small text-ink-2">
            fed by <span className="font-mono">{scene.roles.size}</span> {scene.roles.size === 1 ? "source" : "sources"}
          </span>
        </h1>
        <Segments
          label="View"
          value={view}
          onChange={(next) => show({ view: next === "wires" ? undefined : next })}
          options={[
            { value: "wires", label: "Wires" },
            { value: "bench", label: "Decode bench" },
            { value: "deliver", label: "Deliver" },
          ]}
        />
        <p className="text-small text-ink-2">
          <span className="font-mono">{mapped}</span> of <span className="font-mono">{all}</span> mapped
          {open > 0 ? (
            <>
              , <span className="font-mono">{open}</span> mandatory open
            </>
          ) : null}
        </p>
        <div className="ml-auto flex items-center gap-2">
          {view === "wires" ? (
            <Button
              aria-expanded={isSuggesting}
              onClick={() => {
                setSuggesting(!isSuggesting);
                show({ target: undefined });
              }}
            >
              Suggest <span className="font-mono">{suggestions.length}</span>
            </Button>
          ) : null}
        </div>
      </section>
      <main id="main" tabIndex={-1} className="flex min-h-0 flex-1 flex-col outline-none">
        {scene.lost.length > 0 ? (
          <Notice
            tone="warning"
            className="mx-5 mt-2"
            title={`${scene.lost.length} ${scene.lost.length === 1 ? "row feeds a member" : "rows feed members"} that the type does not have any more`}
          >
            {scene.lost.map((row) => (
              <span key={row.id} className="mr-4 inline-flex items-center gap-2">
                <code>{row.path}</code>
                <Button size="small" blockedBy={actions.blockedBy} onClick={() => actions.removeRow(row.id)}>
                  Remove the row
                </Button>
              </span>
            ))}
          </Notice>
        ) : null}
        {view === "bench" ? (
          <Bench bench={bench} scene={scene} sources={sources} actions={actions} />
        ) : view === "deliver" ? (
          <div className="overflow-y-auto px-5 py-4">
            <DeliverPanel type={{ key: type, name: typeName }} machines={[]} outputs={listOutputs(scene.members)} />
          </div>
        ) : (
          <WireMap
            scene={scene}
            devices={devices}
            actions={actions}
            selected={selected}
            onSelect={(id) => show({ target: id })}
            suggested={new Set(suggestions.map((suggestion) => suggestion.target))}
            readings={bench.readings}
            frames={bench.frames}
          />
        )}
      </main>
      {view !== "wires" ? null : member ? (
        <Drawer
          label={`Mapping of ${member.target.path}`}
          storageKey="mapping-drawer"
          initialHeight={320}
          onClose={() => show({ target: undefined })}
          head={<RowHead member={member} roles={scene.roles} />}
          tools={
            <>
              <AddOutput
                member={member}
                members={scene.members}
                roles={scene.roles}
                actions={actions}
                onAdded={(id) => show({ target: id })}
              />
              {member.row ? <UnmapButton member={member} actions={actions} /> : null}
            </>
          }
        >
          {member.row ? (
            <RowInspector
              key={member.id}
              member={{ ...member, row: member.row }}
              members={scene.members}
              roles={scene.roles}
              reading={bench.readings.get(member.id)}
              findings={findings.get(member.target.key) ?? []}
              actions={actions}
            />
          ) : (
            <OpenRow
              key={member.id}
              member={member}
              members={scene.members}
              roles={scene.roles}
              suggestion={suggestions.find((suggestion) => suggestion.target === member.target.target)}
              actions={actions}
              onAccept={(suggestion) => accept([suggestion])}
              onRefuse={refuse}
            />
          )}
        </Drawer>
      ) : isSuggesting ? (
        <Drawer
          label="Suggestions"
          storageKey="mapping-drawer"
          onClose={() => setSuggesting(false)}
          head={<h2 className="text-small font-semibold">Suggestions</h2>}
        >
          <TagChoice roles={scene.roles} tags={roleTags} />
          <SuggestionList
            suggestions={suggestions}
            roles={scene.roles}
            actions={actions}
            onAccept={(suggestion) => accept([suggestion])}
            onAcceptAll={() => accept(suggestions)}
            onRefuse={refuse}
          />
        </Drawer>
      ) : null}
    </>
  );
}

function nameSuggestion(suggestion: Suggestion): string {
  return `${suggestion.target} ${JSON.stringify(suggestion.source)}`;
}
