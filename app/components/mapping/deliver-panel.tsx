import { Download } from "lucide-react";
import { useOpenModel } from "~/components/model/use-model";
import { buttonClass } from "~/components/ui/button";
import { Icon } from "~/components/ui/icon";
import { Block } from "~/components/ui/page";
import type { NodeKey } from "~/domain/address-space/node-id";

type Props = { typeKey: NodeKey; typeName: string };

const files = [
  [
    "mapping.json",
    "Mapping document",
    "JSON by the published schema: sources, layouts, transforms, units, quality. Read back it gives the same mapping.",
  ],
  ["mapping.csv", "Mapping as a table", "CSV for people: one row a Variable."],
  ["signals.xlsx", "Signal list", "A workbook with every signal, its unit, range and source."],
] as const;

/** What leaves the house of this mapping. */
export function DeliverPanel({ typeKey, typeName }: Props) {
  const { workspace } = useOpenModel();
  return (
    <div className="grid content-start gap-6 overflow-y-auto px-5 py-4">
      <Block title="Files" about={<em>{typeName}</em>}>
        <ul className="border-t border-ink">
          {files.map(([what, name, about]) => (
            <li
              key={what}
              className="grid grid-cols-[220px_minmax(0,1fr)_auto] items-center gap-4 border-b border-hair py-2 text-small"
            >
              <span className="font-semibold">{name}</span>
              <span className="text-ink-2">{about}</span>
              <a
                href={`/models/${workspace.model.id}/deliver/${what}?type=${encodeURIComponent(typeKey)}`}
                download
                className={buttonClass("plain", "small")}
              >
                <Icon of={Download} /> {what}
              </a>
            </li>
          ))}
        </ul>
      </Block>
    </div>
  );
}
