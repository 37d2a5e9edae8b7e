import type { AddressSpace } from "~/domain/address-space/address-space";
import type { DataTypeNode } from "~/domain/address-space/node";
import { findSupertype } from "~/domain/address-space/type-hierarchy";
import { listEncodings } from "~/domain/editing/commands/add-structure";
import { setAbstract, setBaseType } from "~/domain/editing/commands/change-data-type";
import { formatLocalNodeId } from "../model/namespace-label";
import { TypeField } from "../model/type-search";
import { Checkbox } from "../ui/field";
import { getDataTypeKind, getKindRoot, type DataTypeKind } from "./data-type-kind";
import { BitTable, EnumerationTable } from "./named-numbers";
import { StructureFieldsTable } from "./structure-fields";
import { Consequences, useDataTypeEdit } from "./use-data-type-edit";

type Props = { space: AddressSpace; node: DataTypeNode; readOnly: boolean };

const TITLES: Readonly<Record<DataTypeKind, string>> = {
  structure: "Structure",
  union: "Union",
  "option set": "Option set",
  enumeration: "Enumeration",
  simple: "Simple type",
};

/** Everything that makes a DataType: its base, whether it is abstract, its encodings, its fields, values or bits. */
export function DataTypeDesigner({ space, node, readOnly }: Props) {
  const edit = useDataTypeEdit(space, node.key);
  const kind = getDataTypeKind(space, node);
  const supertype = findSupertype(space, node.key);
  const hasEncodings = kind === "structure" || kind === "union" || listEncodings(space, node.key).length > 0;
  return (
    <section aria-label={TITLES[kind]} className="data-type-designer">
      <div className="data-type-head">
        <span className="font-medium">{TITLES[kind]}</span>
        <span className="text-note text-ink-3">below</span>
        <span className="w-52">
          <TypeField
            label="Base type"
            space={space}
            kind="DataType"
            value={supertype}
            below={getKindRoot(space, node)}
            readOnly={readOnly || supertype === undefined}
            onPick={(base) =>
              edit.edit("set-base-type", (current, context) =>
                setBaseType(current, context, { dataType: node.key, supertype: base }),
              )
            }
          />
        </span>
        <Checkbox
          label="abstract"
          checked={node.isAbstract === true}
          disabled={readOnly}
          onChange={(event) => {
            const isAbstract = event.currentTarget.checked;
            edit.edit("set-isAbstract", (current, context) =>
              setAbstract(current, context, { dataType: node.key, isAbstract }),
            );
          }}
        />
        {hasEncodings ? <Encodings space={space} node={node} /> : null}
      </div>
      <Consequences space={space} edit={edit} />
      <div className="mt-2 min-w-0 overflow-x-auto">
        <Members kind={kind} space={space} node={node} readOnly={readOnly} edit={edit} />
      </div>
    </section>
  );
}

function Members({ kind, edit, ...rest }: Props & { kind: DataTypeKind; edit: ReturnType<typeof useDataTypeEdit> }) {
  switch (kind) {
    case "structure":
    case "union":
      return <StructureFieldsTable {...rest} edit={edit} isUnion={kind === "union"} />;
    case "enumeration":
      return <EnumerationTable {...rest} edit={edit} />;
    case "option set":
      return <BitTable {...rest} edit={edit} />;
    case "simple":
      return <p className="text-small text-ink-3">Its values are those of its base type; only the name says more.</p>;
  }
}

/** The encodings with the NodeIds by which a value names its type on the wire and in files. */
function Encodings({ space, node }: { space: AddressSpace; node: DataTypeNode }) {
  const encodings = listEncodings(space, node.key).flatMap((key) => space.getNode(key) ?? []);
  return (
    <span className="text-note text-ink-3" title="NodeIds of the encodings">
      {encodings.length === 0 ? (
        "no encodings"
      ) : (
        <>
          encodings{" "}
          {encodings.map((encoding) => (
            <code key={encoding.key} className="mr-2 font-mono">
              {encoding.browseName.name.replace("Default ", "")} {formatLocalNodeId(encoding.nodeId)}
            </code>
          ))}
        </>
      )}
    </span>
  );
}
