import { useState, type KeyboardEvent } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { Combobox } from "../ui/combobox";
import { Kbd } from "../ui/tag";
import { formatRange, type UnitFacts } from "./analog-facts";
import { findMemberOwner } from "./member-owner";
import { findSpokenUnit, useUnitTable } from "./unit-lookup";
import { isInType } from "./list-parents";
import { findTypeByName } from "./find-types";
import { getNodeName, RULE_KEYS } from "./member-facts";
import { parsePhrase, type SpokenMember, type SpokenType } from "./parse-phrase";
import { useOpenModel, useSelection } from "./use-model";

type Props = { space: AddressSpace; placeholder?: string; isBare?: boolean };

/** "oil level %": says what a member carries, and the member with its type and unit is made. Enter adds, the next can follow at once. */
export function SayInput({ space, placeholder, isBare = false }: Props) {
  const { actions } = useOpenModel();
  const selection = useSelection();
  const [phrase, setPhrase] = useState("");
  useUnitTable(phrase !== "");
  const [owner, setOwner] = useState<NodeKey>();
  const selected = findMemberOwner(space, selection.at(-1));
  // While members are added one after the other the selection goes to the newest; they all belong to the same owner.
  const parent = selected ?? (owner !== undefined && space.isOwn(owner) ? owner : undefined);
  const spoken = parsePhrase(phrase, findSpokenUnit, (name) => findSpokenType(space, name));
  const target = parent === undefined ? "select a card first" : `to ${getNodeName(space, parent)}`;

  function add(member: SpokenMember<UnitFacts>): void {
    if (parent === undefined) return;
    const { kind, name, typeDefinition, dataType, unit, range, isOptional } = member;
    const rule = isOptional && isInType(space, parent) ? { rule: RULE_KEYS.Optional } : {};
    const made =
      kind === "Method"
        ? actions.addMethod({ parent, name, ...rule })
        : kind === "Object"
          ? actions.addObject({ parent, name, typeDefinition, ...rule })
          : actions.addVariable({
              parent,
              name,
              typeDefinition,
              ...rule,
              ...(dataType === undefined ? {} : { dataType }),
              ...(unit ? { unit: unit.information } : {}),
              ...(range ? { range } : {}),
            });
    if (made === undefined) return;
    setOwner(parent);
    setPhrase("");
  }

  const combobox = (id: string | undefined) => (
    <Combobox<SpokenMember<UnitFacts>>
      label="Say what the member carries"
      {...(id === undefined ? {} : { id })}
      size="small"
      query={phrase}
      onQuery={setPhrase}
      items={spoken && parent !== undefined ? [spoken] : []}
      itemKey={(member) => member.name}
      renderItem={(member) => <SpokenRow space={space} member={member} target={target} />}
      onPick={add}
      placeholder={placeholder ?? (parent === undefined ? "oil level %" : `oil level %  ${target}`)}
      none={phrase === "" ? "A name, a unit, a range, a type: oil level % 0 … 100 optional" : parent === undefined ? "Select the card that the member belongs to" : "Type a name first"}
      foot={
        <>
          <span className="truncate">
            {isInType(space, parent) ? (spoken?.isOptional ? "Optional member" : "Mandatory member") : "Member"} {target}
          </span>
          <span className="ml-auto">
            <Kbd>Enter</Kbd>
          </span>
        </>
      }
    />
  );
  /** Esc closes the list first, then goes back to where the member was added. */
  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.key === "Escape") document.querySelector<HTMLElement>("[data-keyboard]")?.focus({ preventScroll: true });
  };
  return (
    <div className="contents" onKeyDown={onKeyDown}>
      {isBare ? null : (
        <label htmlFor="say-what-it-carries">
          or say what it carries <Kbd>A</Kbd>
        </label>
      )}
      {combobox(isBare ? undefined : "say-what-it-carries")}
    </div>
  );
}

function findSpokenType(space: AddressSpace, name: string): SpokenType | undefined {
  const found = findTypeByName(space, name, ["DataType", "VariableType", "ObjectType"]);
  return found && { key: found.key, kind: found.nodeClass as SpokenType["kind"] };
}

function SpokenRow({ space, member, target }: { space: AddressSpace; member: SpokenMember<UnitFacts>; target: string }) {
  const facts = [member.dataType === undefined ? "" : getNodeName(space, member.dataType), member.unit ? `${member.unit.symbol} ${member.unit.name}` : "", formatRange(member.range)];
  return (
    <span className="type-hit">
      <NodeClassGlyph kind={member.kind} />
      <span>
        Add <b className="font-semibold">{member.name}</b> {target}
      </span>
      <code />
      <p>
        {member.kind === "Method" ? member.kind : <em>{getNodeName(space, member.typeDefinition)}</em>} {facts.filter((fact) => fact !== "").join(" · ")}
      </p>
    </span>
  );
}
