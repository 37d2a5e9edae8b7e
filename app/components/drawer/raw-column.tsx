import { useState } from "react";
import type { MethodNode, Node, XmlText } from "~/domain/address-space/node";
import { findText } from "~/domain/address-space/qualified-name";
import { formatProblem } from "~/domain/core/problem-texts";
import { readFragment } from "~/domain/nodeset/values/xml-fragment";
import { Button } from "../ui/button";
import { TextArea } from "../ui/field";
import { useSetOne } from "./attributes-column";
import { CommitField } from "./particular";
import { SmallTable } from "./small-table";

type Props = { node: Node; readOnly: boolean };

/** What a file says in XML of its own: extensions, translations, and the descriptions of arguments. */
export function RawColumn({ node, readOnly }: Props) {
  const set = useSetOne(node);
  const unknown = [...(node.otherElements ?? [])];
  return (
    <section aria-label="Extensions">
      {node.nodeClass === "Method" ? <ArgumentDescriptions node={node} readOnly={readOnly} /> : null}
      <XmlList
        title="Extensions"
        one="Extension"
        list={node.extensions ?? []}
        readOnly={readOnly}
        onChange={(list) => set("extensions", list.length === 0 ? undefined : list)}
      />
      {node.nodeClass === "Variable" && (node.translations || !readOnly) ? (
        <>
          <div className="h-2" />
          <XmlList
            title="Translations"
            one="Translation"
            list={node.translations ?? []}
            readOnly={readOnly}
            onChange={(list) => set("translations", list.length === 0 ? undefined : list)}
          />
        </>
      ) : null}
      {unknown.length > 0 || node.otherAttributes ? (
        <>
          <h3 className="mt-2">Kept as it is</h3>
          {Object.entries(node.otherAttributes ?? {}).map(([name, value]) => (
            <p key={name} className="font-mono text-note break-all text-ink-2">
              {name}=“{value}”
            </p>
          ))}
          {unknown.map((element, i) => (
            <pre key={i} className="overflow-x-auto font-mono text-note text-ink-2">
              {element.xml}
            </pre>
          ))}
        </>
      ) : null}
    </section>
  );
}

type ListProps = {
  title: string;
  one: string;
  list: readonly XmlText[];
  readOnly: boolean;
  onChange: (list: readonly XmlText[]) => void;
};

/** Pieces of XML, each kept when it is left and well-formed. */
function XmlList({ title, one, list, readOnly, onChange }: ListProps) {
  const [isAdding, setAdding] = useState(false);
  return (
    <>
      <h3>
        {title} <span className="font-mono font-normal">{list.length}</span>
      </h3>
      {list.map((xml, index) => (
        <XmlField
          key={index}
          label={`${one} ${index + 1}`}
          xml={xml}
          readOnly={readOnly}
          onCommit={(next) =>
            onChange(
              next === undefined
                ? list.filter((_, i) => i !== index)
                : list.map((old, i) => (i === index ? next : old)),
            )
          }
        />
      ))}
      {isAdding ? (
        <XmlField
          label={`New ${one.toLowerCase()}`}
          xml={{ xml: "" }}
          readOnly={false}
          onCommit={(next) => {
            setAdding(false);
            if (next) onChange([...list, next]);
          }}
        />
      ) : null}
      {readOnly || isAdding ? null : (
        <Button size="small" tone="bare" className="-ml-1.5" onClick={() => setAdding(true)}>
          Add {one.toLowerCase()}
        </Button>
      )}
    </>
  );
}

function XmlField({
  label,
  xml,
  readOnly,
  onCommit,
}: {
  label: string;
  xml: XmlText;
  readOnly: boolean;
  onCommit: (xml: XmlText | undefined) => void;
}) {
  const [text, setText] = useState(xml.xml);
  const read = readFragment({ ...xml, xml: text });
  return (
    <div className="mb-1">
      <TextArea
        mono
        aria-label={label}
        rows={Math.min(8, Math.max(2, text.split("\n").length))}
        value={text}
        readOnly={readOnly}
        spellCheck={false}
        placeholder="<Note xmlns=…>…</Note>"
        {...(read.ok ? {} : { "aria-invalid": true })}
        onChange={(event) => setText(event.currentTarget.value)}
        onKeyDown={(event) => event.stopPropagation()}
        onBlur={() => {
          if (!read.ok || (text === xml.xml && text !== "")) return;
          onCommit(text.trim() === "" ? undefined : { ...xml, xml: text });
        }}
      />
      {read.ok ? null : (
        <p role="alert" className="text-note text-error">
          Not well-formed, so not kept: {read.problems.map(formatProblem).join(" ")}
        </p>
      )}
    </div>
  );
}

/** Descriptions of arguments in the node itself, beside those in InputArguments (OPC 10000-6 §F.9). */
function ArgumentDescriptions({ node, readOnly }: { node: MethodNode; readOnly: boolean }) {
  const set = useSetOne(node);
  const list = node.argumentDescriptions ?? [];
  const write = (next: typeof list): void => set("argumentDescriptions", next.length === 0 ? undefined : next);
  return (
    <>
      <SmallTable
        title="Argument descriptions"
        columns={[{ title: "Argument", width: "38%" }, { title: "Description" }]}
        rows={list}
        readOnly={readOnly}
        nameOf={(entry) => `description of ${entry.name}`}
        addLabel="Description"
        onAdd={() => write([...list, { name: `Argument${list.length + 1}`, description: [{ text: "" }] }])}
        onRemove={(index) => write(list.filter((_, i) => i !== index))}
        cells={(entry, index) => [
          <CommitField
            key="name"
            isBare
            mono
            label={`Argument of description ${index + 1}`}
            value={entry.name}
            readOnly={readOnly}
            onCommit={(name) => write(list.map((old, i) => (i === index ? { ...old, name } : old)))}
          />,
          <CommitField
            key="text"
            isBare
            label={`Text of description ${index + 1}`}
            value={findText(entry.description) ?? ""}
            readOnly={readOnly}
            onCommit={(text) =>
              write(
                list.map((old, i) =>
                  i === index
                    ? { ...old, description: [{ ...old.description[0], text }, ...old.description.slice(1)] }
                    : old,
                ),
              )
            }
          />,
        ]}
      />
      <div className="h-2" />
    </>
  );
}
