import { Plus, Search } from "lucide-react";
import { useMemo, useState, type KeyboardEvent } from "react";
import { findTypes, type TypeHit, type TypeKind } from "~/components/model/find-types";
import type { OpenModel } from "~/components/model/use-model";
import { NodeClassGlyph } from "~/components/notation/node-class-glyph";
import { Button } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Input } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Segments } from "~/components/ui/segments";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { isTypeNode } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { AddDataTypeForm } from "./add-data-type-form";
import { TypeActions } from "./type-actions";
import { TypeDetail } from "./type-detail";

const most = 200;

/** The class of the type that the address names. */
function findKind(space: AddressSpace, key: NodeKey | undefined): TypeKind | undefined {
  const node = key === undefined ? undefined : space.getNode(key);
  return node && isTypeNode(node) ? node.nodeClass : undefined;
}

type Props = {
  model: OpenModel;
  space: AddressSpace;
  shown: NodeKey | undefined;
  onShow: (key: NodeKey) => void;
  editBlockedBy: string | undefined;
};

/** The types of all loaded models: found on the left, told in the middle, used on the right. */
export function TypesView({ model, space, shown, onShow, editBlockedBy }: Props) {
  const [kind, setKind] = useState<TypeKind>(() => findKind(space, shown) ?? "ObjectType");
  const [query, setQuery] = useState("");
  const [isAdding, setAdding] = useState(false);
  const hits = useMemo(() => findTypes(space, { kind }, query, most), [space, kind, query]);
  const type = space.getNode(shown ?? hits[0]?.key ?? ("" as NodeKey));
  return (
    <main id="main" tabIndex={-1} className="grid min-h-0 flex-1 grid-cols-[300px_minmax(0,1fr)_330px] outline-none">
      <h1 className="sr-only">Types of the loaded models</h1>
      <section aria-label="Find a type" className="flex min-h-0 flex-col border-r border-rule bg-bench">
        <div className="grid gap-2 border-b border-rule p-3">
          <label className="relative">
            <span className="sr-only">Search types</span>
            <Icon of={Search} className="pointer-events-none absolute inset-y-0 left-2 my-auto text-ink-3" />
            <Input
              type="search"
              value={query}
              onChange={(event) => setQuery(event.currentTarget.value)}
              placeholder="Name or description"
              className="pl-7"
            />
          </label>
          <Segments
            label="Class of type"
            className="justify-self-start"
            value={kind}
            onChange={setKind}
            options={[
              { value: "ObjectType", label: "Object" },
              { value: "VariableType", label: "Variable" },
              { value: "DataType", label: "Data" },
              { value: "ReferenceType", label: "Reference" },
            ]}
          />
          {kind === "DataType" ? (
            <Button
              size="small"
              icon={Plus}
              className="justify-self-start"
              blockedBy={editBlockedBy}
              onClick={() => setAdding(true)}
            >
              New DataType
            </Button>
          ) : null}
          <p className="text-note text-ink-3">
            <span className="font-mono">{hits.length === most ? `${most}+` : hits.length}</span> in{" "}
            <span className="font-mono">{space.layers.length}</span> loaded models
          </p>
        </div>
        <TypeList hits={hits} shown={type?.key} onShow={onShow} />
      </section>
      <div className="min-h-0 overflow-y-auto px-6 py-4">
        {type ? <TypeDetail space={space} type={type} modelId={model.workspace.model.id} onShow={onShow} /> : null}
      </div>
      <div className="min-h-0 overflow-y-auto border-l border-rule bg-bench px-4 py-4">
        {isAdding ? (
          <section aria-label="New DataType" className="types-adding">
            <h2 className="text-lead font-semibold">New DataType</h2>
            <AddDataTypeForm
              onDone={(_name, _closes, key) => {
                setAdding(false);
                onShow(key);
              }}
            />
            <Button size="small" tone="bare" onClick={() => setAdding(false)}>
              Close
            </Button>
          </section>
        ) : type ? (
          <TypeActions model={model} space={space} type={type} editBlockedBy={editBlockedBy} />
        ) : null}
      </div>
    </main>
  );
}

function TypeList({
  hits,
  shown,
  onShow,
}: {
  hits: readonly TypeHit[];
  shown: NodeKey | undefined;
  onShow: (key: NodeKey) => void;
}) {
  /** Arrow keys walk the list as in any other. */
  function onKeyDown(event: KeyboardEvent<HTMLUListElement>) {
    const step = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    if (step === undefined) return;
    const rows = [...event.currentTarget.querySelectorAll<HTMLButtonElement>("button")];
    const next = rows[rows.findIndex((row) => row === document.activeElement) + step];
    if (!next) return;
    event.preventDefault();
    next.focus();
    next.click();
  }
  return (
    <ul className="min-h-0 flex-1 overflow-y-auto" onKeyDown={onKeyDown}>
      {hits.map((hit) => (
        <li key={hit.key}>
          <button
            type="button"
            aria-current={hit.key === shown || undefined}
            onClick={() => onShow(hit.key)}
            className={cx(
              "grid h-7 w-full grid-cols-[20px_minmax(0,1fr)_auto] items-center gap-1.5 border-b border-hair px-3 text-left text-small focus-visible:-outline-offset-2",
              hit.key === shown ? "bg-copper-wash shadow-[inset_3px_0_0_var(--copper)]" : "hover:bg-bench-2",
            )}
          >
            <NodeClassGlyph kind={hit.kind} />
            <i className={cx("truncate", hit.isAbstract && "text-ink-3")}>{hit.name}</i>
            <span className="font-mono text-note text-ink-3">{hit.namespaceLabel}</span>
          </button>
        </li>
      ))}
      {hits.length === 0 ? <li className="p-3 text-small text-ink-2">No type of this class has these words.</li> : null}
    </ul>
  );
}
