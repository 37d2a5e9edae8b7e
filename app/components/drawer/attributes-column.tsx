import type { AddressSpace } from "~/domain/address-space/address-space";
import { hasValueAttributes, isTypeNode, type Node } from "~/domain/address-space/node";
import { standardKey } from "~/domain/address-space/node-id";
import { setAttribute, type SetAttributeIntent } from "~/domain/editing/commands/set-attribute";
import { setValueRank } from "~/domain/editing/commands/set-value-rank";
import { getNodeName } from "../model/member-facts";
import { NodeSearch } from "../model/node-search";
import { useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { Checkbox, Select } from "../ui/field";
import { BitField } from "./bit-field";
import { CommitField, Fact, Particular } from "./particular";
import { parseDimensions } from "./value-bench";
import { useState } from "react";

/** Option sets of namespace 0 that name the bits (OPC 10000-3 §8.55–8.59). */
export const BIT_TYPES = {
  accessLevel: standardKey(15406),
  eventNotifier: standardKey(15033),
  writeMask: standardKey(347),
  accessRestrictions: standardKey(95),
  permissions: standardKey(94),
} as const;

type Props = { space: AddressSpace; node: Node; readOnly: boolean };

export type SetOne = (attribute: SetAttributeIntent["attribute"], value: unknown) => void;

/** Sets or takes away one attribute of the node. */
export function useSetOne(node: Node): SetOne {
  const { actions } = useOpenModel();
  return (attribute, value) =>
    void actions.apply(`set-${attribute}`, (space, context) =>
      setAttribute(space, context, { node: node.key, attribute, ...(value === undefined ? {} : { value }) }),
    );
}

/** What tools and papers say of the node, and the attributes of its class that the other columns have no place for. */
export function AttributesColumn({ space, node, readOnly }: Props) {
  const set = useSetOne(node);
  return (
    <section aria-label="Attributes">
      <h3>Attributes</h3>
      <Particular label="Symbol">
        {(id) => (
          <CommitField
            id={id}
            mono
            value={node.symbolicName ?? ""}
            placeholder="as BrowseName"
            readOnly={readOnly}
            onCommit={(text) => set("symbolicName", text.trim() === "" ? undefined : text.trim())}
          />
        )}
      </Particular>
      <Particular label="Categories">
        {(id) => (
          <CommitField
            id={id}
            value={(node.category ?? []).join(", ")}
            placeholder="none"
            readOnly={readOnly}
            onCommit={(text) => {
              const list = text
                .split(",")
                .map((part) => part.trim())
                .filter((part) => part !== "");
              set("category", list.length === 0 ? undefined : list);
            }}
          />
        )}
      </Particular>
      <Particular label="Release">
        {(id) => (
          <Select
            id={id}
            size="small"
            value={node.releaseStatus ?? ""}
            disabled={readOnly}
            onChange={(event) => set("releaseStatus", event.currentTarget.value || undefined)}
          >
            <option value="">Released, not written</option>
            <option>Released</option>
            <option>Draft</option>
            <option>Deprecated</option>
          </Select>
        )}
      </Particular>
      {isTypeNode(node) ? null : (
        <Fact label="">
          <Checkbox
            label="for design tools only"
            checked={node.designToolOnly === true}
            disabled={readOnly}
            onChange={(event) => set("designToolOnly", event.currentTarget.checked ? true : undefined)}
          />
        </Fact>
      )}
      <ClassAttributes space={space} node={node} readOnly={readOnly} />
    </section>
  );
}

function ClassAttributes({ space, node, readOnly }: Props) {
  const set = useSetOne(node);
  const flag = (label: string, attribute: SetAttributeIntent["attribute"], isSet: boolean, byDefault = false) => (
    <Fact label="">
      <Checkbox
        label={label}
        checked={isSet}
        disabled={readOnly}
        onChange={(event) =>
          set(attribute, event.currentTarget.checked === byDefault ? undefined : event.currentTarget.checked)
        }
      />
    </Fact>
  );
  switch (node.nodeClass) {
    case "Variable":
      return (
        <>
          <SizesRow space={space} node={node} readOnly={readOnly} />
          <BitField
            label="Access"
            space={space}
            dataType={BIT_TYPES.accessLevel}
            value={node.accessLevel}
            fallback={1}
            readOnly={readOnly}
            onChange={(bits) => set("accessLevel", bits)}
          />
          <BitField
            label="User access"
            space={space}
            dataType={BIT_TYPES.accessLevel}
            value={node.userAccessLevel}
            fallback={1}
            readOnly={readOnly}
            onChange={(bits) => set("userAccessLevel", bits)}
          />
          {flag("values are recorded", "historizing", node.historizing === true)}
        </>
      );
    case "VariableType":
      return <SizesRow space={space} node={node} readOnly={readOnly} />;
    case "Object":
      return (
        <BitField
          label="Events"
          space={space}
          dataType={BIT_TYPES.eventNotifier}
          value={node.eventNotifier}
          readOnly={readOnly}
          onChange={(bits) => set("eventNotifier", bits)}
        />
      );
    case "View":
      return (
        <>
          <BitField
            label="Events"
            space={space}
            dataType={BIT_TYPES.eventNotifier}
            value={node.eventNotifier}
            readOnly={readOnly}
            onChange={(bits) => set("eventNotifier", bits)}
          />
          {flag("contains no loops", "containsNoLoops", node.containsNoLoops === true)}
        </>
      );
    case "Method":
      return (
        <>
          {flag("this user may call it", "userExecutable", node.userExecutable !== false, true)}
          <DeclarationRow space={space} node={node} readOnly={readOnly} />
        </>
      );
    case "DataType":
      return (
        <Particular label="Purpose">
          {(id) => (
            <Select
              id={id}
              size="small"
              value={node.purpose ?? ""}
              disabled={readOnly}
              onChange={(event) => set("purpose", event.currentTarget.value || undefined)}
            >
              <option value="">Normal, not written</option>
              <option>Normal</option>
              <option>ServicesOnly</option>
              <option>CodeGenerator</option>
            </Select>
          )}
        </Particular>
      );
    default:
      return null;
  }
}

/** ArrayDimensions: one length for each dimension, 0 for any. */
function SizesRow({ node, readOnly }: Props) {
  const { actions } = useOpenModel();
  if (!hasValueAttributes(node)) return null;
  const rank = node.valueRank ?? -1;
  return (
    <Particular label="Sizes">
      {(id) => (
        <CommitField
          id={id}
          mono
          value={node.arrayDimensions ?? ""}
          placeholder={rank >= 1 ? "any" : "only with a fixed rank"}
          readOnly={readOnly || rank < 1}
          onCommit={(text) => {
            const arrayDimensions = parseDimensions(text.replaceAll("×", ","));
            actions.apply("set-sizes", (space, context) =>
              setValueRank(space, context, {
                node: node.key,
                valueRank: rank,
                ...(arrayDimensions.length > 0 ? { arrayDimensions } : {}),
              }),
            );
          }}
        />
      )}
    </Particular>
  );
}

/** MethodDeclarationId: the Method of the type that this one answers for (OPC 10000-6 §F.9). */
function DeclarationRow({ space, node, readOnly }: Props) {
  const set = useSetOne(node);
  const [isSearching, setSearching] = useState(false);
  const declaration = node.nodeClass === "Method" ? node.methodDeclaration : undefined;
  return (
    <Fact label="Declared by">
      {isSearching ? (
        <NodeSearch
          label="Method of the type"
          space={space}
          onPick={(key) => {
            setSearching(false);
            if (space.getNode(key)?.nodeClass === "Method") set("methodDeclaration", key);
          }}
          onCancel={() => setSearching(false)}
        />
      ) : (
        <span className="flex items-center gap-1.5">
          <span className="truncate">
            {declaration === undefined ? "no Method of a type" : getNodeName(space, declaration)}
          </span>
          {readOnly ? null : (
            <>
              <Button
                size="small"
                tone="bare"
                aria-label="Choose the Method of the type"
                onClick={() => setSearching(true)}
              >
                Choose
              </Button>
              {declaration === undefined ? null : (
                <Button
                  size="small"
                  tone="bare"
                  aria-label="Take the declaration away"
                  onClick={() => set("methodDeclaration", undefined)}
                >
                  None
                </Button>
              )}
            </>
          )}
        </span>
      )}
    </Fact>
  );
}
