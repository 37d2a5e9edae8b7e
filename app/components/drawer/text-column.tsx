import { getAccessLevel, type Node } from "~/domain/address-space/node";
import { useOpenModel } from "../model/use-model";
import { Checkbox } from "../ui/field";
import { LocalisedTexts } from "./localised-texts";
import { CommitField, Fact, Particular } from "./particular";

const ACCESS: readonly (readonly [bit: number, label: string])[] = [
  [1, "read"],
  [2, "write"],
  [4, "history"],
];

/** Texts for people, and who may do what with the value (OPC 10000-3 §8.57). */
export function TextColumn({ node, readOnly }: { node: Node; readOnly: boolean }) {
  const { actions } = useOpenModel();
  return (
    <section aria-label="Text and access">
      <h3>Text and access</h3>
      <Particular label="Description">
        {(id) => (
          <LocalisedTexts
            id={id}
            label="Description"
            rows={2}
            texts={node.description ?? []}
            readOnly={readOnly}
            onChange={(text, locale) =>
              actions.setText({
                node: node.key,
                attribute: "description",
                text,
                ...(locale === undefined ? {} : { locale }),
              })
            }
          />
        )}
      </Particular>
      {node.nodeClass === "Variable" ? (
        <AccessRow level={getAccessLevel(node)} node={node} readOnly={readOnly} />
      ) : null}
      {node.nodeClass === "Method" ? (
        <Fact label="Access">
          <Checkbox
            label="may be called"
            checked={node.executable !== false}
            disabled={readOnly}
            onChange={(event) =>
              actions.setAttribute([node.key], "executable", event.currentTarget.checked ? undefined : false)
            }
          />
        </Fact>
      ) : null}
      {node.nodeClass === "Variable" ? (
        <Particular label="Sampling">
          {(id) => (
            <CommitField
              id={id}
              mono
              unit="ms"
              value={node.minimumSamplingInterval === undefined ? "" : String(node.minimumSamplingInterval)}
              placeholder="any"
              readOnly={readOnly}
              onCommit={(text) => {
                const interval = Number(text.replace(",", "."));
                if (text === "" || Number.isFinite(interval))
                  actions.setAttribute([node.key], "minimumSamplingInterval", text === "" ? undefined : interval);
              }}
            />
          )}
        </Particular>
      ) : null}
      <Particular label="Documents">
        {(id) => (
          <CommitField
            id={id}
            value={node.documentation ?? ""}
            placeholder="link"
            readOnly={readOnly}
            onCommit={(text) => actions.setAttribute([node.key], "documentation", text === "" ? undefined : text)}
          />
        )}
      </Particular>
    </section>
  );
}

/** The default, CurrentRead, is not written. */
function toWritten(level: number): number | undefined {
  return level === 1 ? undefined : level;
}

function AccessRow({ level, node, readOnly }: { level: number; node: Node; readOnly: boolean }) {
  const { actions } = useOpenModel();
  return (
    <Fact label="Access">
      <span className="flex h-6.5 items-center gap-3.5">
        {ACCESS.map(([bit, label]) => (
          <Checkbox
            key={bit}
            label={label}
            checked={(level & bit) !== 0}
            disabled={readOnly}
            onChange={(event) =>
              actions.setAttribute(
                [node.key],
                "accessLevel",
                toWritten(event.currentTarget.checked ? level | bit : level & ~bit),
              )
            }
          />
        ))}
      </span>
    </Fact>
  );
}
