import { Link } from "react-router";
import { getNodeName } from "~/components/model/member-facts";
import { formatLocalNodeId, getNamespaceLabel } from "~/components/model/namespace-label";
import { NodeClassGlyph } from "~/components/notation/node-class-glyph";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { Tag } from "~/components/ui/tag";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getDisplayName } from "~/domain/address-space/browse";
import { isAbstract, type Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { findText } from "~/domain/address-space/qualified-name";
import { listDirectSubtypes, listSupertypes } from "~/domain/address-space/type-hierarchy";
import { useOpenModel } from "../model/use-model";
import { DataTypeDesigner } from "./data-type-designer";
import { listTypeMembers } from "./list-type-members";

type Props = { space: AddressSpace; type: Node; modelId: string; onShow: (key: NodeKey) => void };

/** A type as its model describes it: what it is, from what it comes, what it brings. */
export function TypeDetail({ space, type, modelId, onShow }: Props) {
  const chain = listSupertypes(space, type.key);
  const subtypes = listDirectSubtypes(space, type.key);
  const { actions } = useOpenModel();
  const description = findText(type.description ?? []);
  return (
    <article aria-label={getDisplayName(type)} className="grid grid-cols-[minmax(0,1fr)] content-start gap-4">
      <header>
        <p className="flex flex-wrap items-center gap-2">
          <NodeClassGlyph kind={type.nodeClass} width={26} label />
          <span className="font-mono text-small text-ink-3">{getNamespaceLabel(type.nodeId.namespaceUri)}</span>
          <b className="text-title font-semibold tracking-[-0.02em] italic">{getDisplayName(type)}</b>
          {isAbstract(type) ? <Tag>abstract</Tag> : null}
          {space.isOwn(type.key) ? (
            <Link to={`/models/${modelId}/register?node=${encodeURIComponent(type.key)}`}>
              <Tag tone="ink">your own: open</Tag>
            </Link>
          ) : null}
          <span className="font-mono text-note text-ink-3">{formatLocalNodeId(type.nodeId)}</span>
        </p>
        <p className="mt-2 max-w-160 text-body text-ink-2">{description ?? "Its model gives no description."}</p>
        {type.documentation ? (
          <a
            href={type.documentation}
            target="_blank"
            rel="noreferrer"
            className="mt-1 inline-block font-mono text-note text-ink-3 underline decoration-rule underline-offset-3"
          >
            {type.documentation}
          </a>
        ) : null}
      </header>
      <TypeLinks label="Comes from" space={space} keys={chain} onShow={onShow} />
      {subtypes.length > 0 ? (
        <TypeLinks
          label="Subtypes"
          space={space}
          keys={subtypes.slice(0, 24)}
          more={subtypes.length - 24}
          onShow={onShow}
        />
      ) : null}
      {type.nodeClass === "DataType" ? (
        <DataTypeDesigner key={type.key} space={space} node={type} readOnly={!actions.mayChange(type.key)} />
      ) : (
        <MemberTable space={space} type={type} />
      )}
    </article>
  );
}

function MemberTable({ space, type }: { space: AddressSpace; type: Node }) {
  const members = listTypeMembers(space, type.key);
  return (
    <section>
      <h2 className="mb-1 text-lead font-semibold">
        Members <span className="font-mono font-normal text-ink-3">{members.length}</span>
      </h2>
      {members.length === 0 ? (
        <p className="border-t border-ink pt-2 text-small text-ink-2">None.</p>
      ) : (
        <TableScroll label="Members">
          <Table caption={`Members of ${getDisplayName(type)}`}>
            <thead>
              <tr>
                <Th>Name</Th>
                <Th>Type</Th>
                <Th>DataType</Th>
                <Th right>Count</Th>
                <Th>Description</Th>
              </tr>
            </thead>
            <tbody>
              {members.map((member) => (
                <Tr key={member.key} className={member.origin ? "text-ink-3" : ""}>
                  <Td>
                    <span className="flex items-center gap-1.5 whitespace-nowrap">
                      <NodeClassGlyph kind={member.glyph} label />
                      {member.name}
                    </span>
                  </Td>
                  <Td className="italic">{member.typeName}</Td>
                  <Td mono>{member.dataType}</Td>
                  <Td right mono>
                    {member.cardinality}
                  </Td>
                  <Td className="max-w-80 truncate">
                    <span title={member.description}>
                      {member.origin ? `from ${member.origin}` : member.description}
                    </span>
                  </Td>
                </Tr>
              ))}
            </tbody>
          </Table>
        </TableScroll>
      )}
    </section>
  );
}

type TypeLinksProps = {
  label: string;
  space: AddressSpace;
  keys: readonly NodeKey[];
  more?: number;
  onShow: (key: NodeKey) => void;
};

function TypeLinks({ label, space, keys, more = 0, onShow }: TypeLinksProps) {
  if (keys.length === 0) return null;
  return (
    <p className="flex flex-wrap items-center gap-x-2 gap-y-1 text-small">
      <span className="text-note text-ink-3">{label}</span>
      {keys.map((key) => (
        <button
          key={key}
          type="button"
          onClick={() => onShow(key)}
          className="border-b border-rule italic hover:border-copper hover:text-copper"
        >
          {getNodeName(space, key)}
        </button>
      ))}
      {more > 0 ? <span className="text-ink-3">and {more} more</span> : null}
    </p>
  );
}
