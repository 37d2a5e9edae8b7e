import type { NodeKey } from "~/domain/address-space/node-id";
import type { XmlText } from "~/domain/address-space/node";
import type { RawStructure } from "~/domain/nodeset/values/variant";
import { getNodeName } from "../model/member-facts";
import { Button } from "../ui/button";
import { Notice } from "../ui/notice";
import { makeStructure } from "~/domain/nodeset/values/initial-value";
import { XmlLeaf } from "./text-controls";
import type { DraftItem } from "./value-draft";
import { useValueForm } from "./value-form";

type Props = { label: string; value: RawStructure; dataType: NodeKey; onChange: (item: DraftItem) => void };

/** A structure that is kept as XML, with the reason. */
export function RawBody({ label, value, dataType, onChange }: Props) {
  const form = useValueForm();
  const fresh = form.readOnly ? null : makeStructure(form, dataType);
  return (
    <fieldset className="structure-value" aria-label={label}>
      <Notice
        tone="hint"
        action={
          fresh ? (
            <Button size="small" onClick={() => onChange(fresh)}>
              Begin anew as {getNodeName(form.space, dataType)}
            </Button>
          ) : undefined
        }
      >
        {explain(value)} Type <code className="font-mono break-all">{value.typeId}</code>
      </Notice>
      {value.reason === "no-body" ? null : (
        <XmlLeaf
          label={`XML of ${label}`}
          item={value.body as unknown as DraftItem}
          isNullable={false}
          onChange={(body) => onChange({ ...value, body: body as XmlText })}
        />
      )}
    </fieldset>
  );
}

function explain({ reason }: RawStructure): string {
  switch (reason) {
    case "unknown-type":
      return "This structure is of a DataType that no loaded model has. It stays as XML, as it was written.";
    case "body-mismatch":
      return "The XML of this structure does not fit its DataType. It stays as it was written.";
    case "no-body":
      return "This structure has a type and no body.";
    case "binary-body":
      return "This structure is written in binary form. It stays as it was written.";
  }
}
