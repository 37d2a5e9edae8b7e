import { Lock } from "lucide-react";
import { useMemo, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findParent, findTypeDefinition } from "~/domain/address-space/browse";
import { isTypeNode, type Node } from "~/domain/address-space/node";
import { getOwnNamespace } from "~/domain/address-space/model-header";
import { formatNodeId, type NodeKey } from "~/domain/address-space/node-id";
import { findSupertype } from "~/domain/address-space/type-hierarchy";
import { listParents } from "../model/list-parents";
import { findRuleName, getNodeName, RULE_KEYS, type RuleName } from "../model/member-facts";
import { formatLocalNodeId, getNamespaceLabel } from "../model/namespace-label";
import { TypeField } from "../model/type-search";
import { useOpenModel } from "../model/use-model";
import { Checkbox, Select } from "../ui/field";
import { Icon } from "../ui/icon";
import { Segments } from "../ui/segments";
import { OverrideRow } from "./inherited-members";
import { LocalisedTexts } from "./localised-texts";
import { CommitField, Fact, Particular } from "./particular";

/** What the node is: names, NodeId, path, type, modelling rule. */
export function IdentityColumn({ space, node, readOnly }: { space: AddressSpace; node: Node; readOnly: boolean }) {
  const { actions } = useOpenModel();
  return (
    <section aria-label="Identity">
      <h3>Identity</h3>
      <Particular label="BrowseName">
        {(id) => (
          <div className="localised">
            <CommitField
              id={id}
              mono
              value={node.browseName.name}
              readOnly={readOnly}
              onCommit={(text) => actions.rename(node.key, text)}
            />
            {node.browseName.namespaceUri === getOwnNamespace(space.own.header) ? null : (
              <span className="locale" title={node.browseName.namespaceUri}>
                {getNamespaceLabel(node.browseName.namespaceUri)}
              </span>
            )}
          </div>
        )}
      </Particular>
      <Particular label="DisplayName">
        {(id) => (
          <LocalisedTexts
            id={id}
            label="DisplayName"
            texts={node.displayName}
            readOnly={readOnly}
            onChange={(text, locale) =>
              actions.setText({
                node: node.key,
                attribute: "displayName",
                text,
                ...(locale === undefined ? {} : { locale }),
              })
            }
          />
        )}
      </Particular>
      <Fact label="NodeId" mono>
        <span title={formatNodeId(node.nodeId)} className="flex items-center gap-1.5">
          {formatLocalNodeId(node.nodeId)}
          <Icon of={Lock} size={11} className="text-ink-3" label="is never given twice" />
          <span className="truncate font-words text-note text-ink-3">{node.nodeId.namespaceUri}</span>
        </span>
      </Fact>
      {isTypeNode(node) || readOnly ? null : <OwnerRow space={space} node={node} />}
      <TypeRow space={space} node={node} readOnly={readOnly} />
      {node.nodeClass === "DataType" ? null : isTypeNode(node) ? (
        <Fact label="">
          <Checkbox
            label="Abstract"
            checked={node.isAbstract === true}
            disabled={readOnly}
            onChange={(event) =>
              actions.setAttribute([node.key], "isAbstract", event.currentTarget.checked ? true : undefined)
            }
          />
        </Fact>
      ) : (
        <RuleRow rule={findRuleName(space, node.key)} node={node} readOnly={readOnly} />
      )}
      <OverrideRow space={space} node={node} />
    </section>
  );
}

const FEW_NODES = 4000;

/** The node that holds it; another choice moves it there. */
function OwnerRow({ space, node }: { space: AddressSpace; node: Node }) {
  const { actions } = useOpenModel();
  const owner = findParent(space, node.key);
  // The choices are many in a large model; they are listed when somebody is about to choose.
  const [isAsked, setAsked] = useState(space.own.nodes.size < FEW_NODES);
  const parents = useMemo(() => (isAsked ? listParents(space) : []), [space, isAsked]);
  const isListed = parents.some((parent) => parent.key === owner);
  return (
    <Particular label="Belongs to">
      {(id) => (
        <Select
          id={id}
          size="small"
          value={owner ?? ""}
          onFocus={() => setAsked(true)}
          onPointerDown={() => setAsked(true)}
          onChange={(event) => actions.move([node.key], event.currentTarget.value as NodeKey)}
        >
          {isListed ? null : <option value={owner ?? ""}>{getNodeName(space, owner)}</option>}
          {parents.map((parent) => (
            <option key={parent.key} value={parent.key}>
              {parent.label}
            </option>
          ))}
        </Select>
      )}
    </Particular>
  );
}

function TypeRow({ space, node, readOnly }: { space: AddressSpace; node: Node; readOnly: boolean }) {
  const { actions, view } = useOpenModel();
  if (isTypeNode(node)) {
    const supertype = findSupertype(space, node.key);
    return (
      <Fact label="Subtype of">
        {supertype === undefined ? (
          "–"
        ) : (
          <button
            type="button"
            className="italic underline decoration-rule underline-offset-3 hover:text-copper"
            onClick={() => view.reveal(supertype)}
          >
            {getNodeName(space, supertype)}
          </button>
        )}
      </Fact>
    );
  }
  if (node.nodeClass !== "Object" && node.nodeClass !== "Variable") return <Fact label="Class">{node.nodeClass}</Fact>;
  const type = findTypeDefinition(space, node.key);
  return (
    <Particular label="Type">
      {(id) => (
        <TypeField
          id={id}
          label="Type"
          space={space}
          kind={node.nodeClass === "Object" ? "ObjectType" : "VariableType"}
          value={type}
          readOnly={readOnly}
          onPick={(picked) => actions.setTypeDefinition([node.key], picked)}
        />
      )}
    </Particular>
  );
}

const SHORT: readonly RuleName[] = ["Mandatory", "Optional"];

function RuleRow({ rule, node, readOnly }: { rule: RuleName | undefined; node: Node; readOnly: boolean }) {
  const { actions } = useOpenModel();
  const set = (text: string): void => actions.changeCells([{ key: node.key, column: "rule", text }], "set-rule");
  const isShort = rule !== undefined && SHORT.includes(rule);
  if (readOnly) return <Fact label="Rule">{rule ?? "none"}</Fact>;
  return (
    <Particular label="Rule">
      {(id) => (
        <span className="flex items-center gap-1.5">
          {isShort ? (
            <Segments
              label="Modelling rule"
              value={rule}
              onChange={set}
              options={SHORT.map((name) => ({ value: name, label: name }))}
              className="h-6!"
            />
          ) : null}
          <span className={isShort ? "w-7" : "w-full"}>
            <Select
              id={id}
              size="small"
              aria-label="Modelling rule"
              value={rule ?? ""}
              onChange={(event) => set(event.currentTarget.value)}
              className={isShort ? "w-7! overflow-hidden" : ""}
            >
              <option value="">none</option>
              {Object.keys(RULE_KEYS).map((name) => (
                <option key={name} value={name}>
                  {name}
                </option>
              ))}
            </Select>
          </span>
        </span>
      )}
    </Particular>
  );
}
