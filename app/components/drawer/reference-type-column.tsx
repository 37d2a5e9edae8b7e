import type { ReferenceTypeNode } from "~/domain/address-space/node";
import { useOpenModel } from "../model/use-model";
import { Checkbox } from "../ui/field";
import { LocalisedTexts } from "./localised-texts";
import { Fact, Particular } from "./particular";

/** How a reference reads from its target (OPC 10000-3 §5.3.2). */
export function ReferenceTypeColumn({ node, readOnly }: { node: ReferenceTypeNode; readOnly: boolean }) {
  const { actions } = useOpenModel();
  return (
    <section aria-label="Reference">
      <h3>Reference</h3>
      <Fact label="">
        <Checkbox
          label="Symmetric: reads the same from both ends"
          checked={node.symmetric === true}
          disabled={readOnly}
          onChange={(event) =>
            actions.setAttribute([node.key], "symmetric", event.currentTarget.checked ? true : undefined)
          }
        />
      </Fact>
      {node.symmetric === true ? null : (
        <Particular label="Inverse name">
          {(id) => (
            <LocalisedTexts
              id={id}
              label="Inverse name"
              texts={node.inverseName ?? []}
              readOnly={readOnly}
              onChange={(text, locale) =>
                actions.setText({
                  node: node.key,
                  attribute: "inverseName",
                  text,
                  ...(locale === undefined ? {} : { locale }),
                })
              }
            />
          )}
        </Particular>
      )}
    </section>
  );
}
