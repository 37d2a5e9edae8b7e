import { Check, Plus } from "lucide-react";
import { useMemo, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findTypeDefinition, listMembers } from "~/domain/address-space/browse";
import { isTypeNode, type Node } from "~/domain/address-space/node";
import { listMissingMembers, listOfferedMembers, type OpenMember } from "~/domain/instantiation/missing-members";
import { findRuleName, getClassName, isProperty } from "../model/member-facts";
import { useOpenModel } from "../model/use-model";
import { Button } from "../ui/button";
import { Icon } from "../ui/icon";
import { InheritedMembers } from "./inherited-members";

const MOST = 120;

/** What a type or an Object is made of, and what an Object could have beside it. */
export function MembersColumn({ space, node, readOnly }: { space: AddressSpace; node: Node; readOnly: boolean }) {
  return (
    <section aria-label="Members">
      <Summary space={space} node={node} />
      {isTypeNode(node) ? <InheritedMembers space={space} type={node.key} readOnly={readOnly} /> : null}
      {!isTypeNode(node) && findTypeDefinition(space, node.key) !== undefined && space.isOwn(node.key) ? (
        <OpenMembers space={space} node={node} readOnly={readOnly} />
      ) : null}
    </section>
  );
}

function Summary({ space, node }: { space: AddressSpace; node: Node }) {
  const members = listMembers(space, node.key);
  const rows = new Map<string, { all: number; mandatory: number; optional: number }>();
  for (const member of members) {
    const name = getClassName(member.nodeClass, isProperty(space, member));
    const row = rows.get(name) ?? { all: 0, mandatory: 0, optional: 0 };
    const rule = findRuleName(space, member.key);
    row.all++;
    if (rule === "Mandatory" || rule === "MandatoryPlaceholder") row.mandatory++;
    if (rule === "Optional" || rule === "OptionalPlaceholder") row.optional++;
    rows.set(name, row);
  }
  return (
    <>
      <h3>
        Members <span className="font-mono font-normal">{members.length}</span>
      </h3>
      {rows.size === 0 ? <p className="text-small text-ink-3">None of its own yet.</p> : null}
      {rows.size > 0 ? (
        <table className="small-table is-counts" aria-label="Members by class">
          <thead>
            <tr>
              <th scope="col">Class</th>
              <th scope="col">All</th>
              <th scope="col">Mandatory</th>
              <th scope="col">Optional</th>
            </tr>
          </thead>
          <tbody>
            {[...rows].map(([name, row]) => (
              <tr key={name}>
                <td>{name}</td>
                <td>{row.all}</td>
                <td>{row.mandatory || ""}</td>
                <td>{row.optional || ""}</td>
              </tr>
            ))}
          </tbody>
        </table>
      ) : null}
    </>
  );
}

function OpenMembers({ space, node, readOnly }: { space: AddressSpace; node: Node; readOnly: boolean }) {
  const { actions } = useOpenModel();
  const [showsDetails, setShowsDetails] = useState(false);
  const { missing, groups } = useMemo(() => {
    const open = listOfferedMembers(space, node.key).filter((member) => !member.isPlaceholder);
    // Properties of Variables are many and rarely wanted: InstrumentRange, Definition and their like.
    const isDetail = (member: OpenMember): boolean =>
      member.parent !== node.key && space.getNode(member.parent)?.nodeClass === "Variable";
    return {
      missing: listMissingMembers(space, node.key),
      groups: { members: open.filter((m) => !isDetail(m)), details: open.filter(isDetail) },
    };
  }, [space, node.key]);
  const offered = [...groups.members, ...(showsDetails ? groups.details : [])].slice(0, MOST);
  return (
    <>
      <Completeness missing={missing} node={node} readOnly={readOnly} />
      {groups.members.length + groups.details.length > 0 ? (
        <div className="mt-3">
          <h3>
            Optional members of its type <span className="font-mono font-normal">{groups.members.length}</span>
          </h3>
          <ul className="grid gap-px">
            {offered.map((member) => (
              <li key={member.pathKey} className="reference-item">
                <span>{formatPath(member)}</span>
                {readOnly ? null : (
                  <Button
                    size="small"
                    tone="bare"
                    icon={Plus}
                    className="ml-auto h-5!"
                    aria-label={`Add ${formatPath(member)}`}
                    onClick={() => actions.addOptionalMembers(node.key, [member.pathKey])}
                  >
                    Add
                  </Button>
                )}
              </li>
            ))}
          </ul>
          {groups.details.length > 0 && !showsDetails ? (
            <Button size="small" tone="bare" className="-ml-2" onClick={() => setShowsDetails(true)}>
              and {groups.details.length} Properties of its Variables
            </Button>
          ) : null}
        </div>
      ) : null}
    </>
  );
}

const MOST_MISSING = 40;

/** Whether the instance has every mandatory member of its type, at any depth, and one press that adds what it lacks. */
function Completeness({ missing, node, readOnly }: { missing: readonly OpenMember[]; node: Node; readOnly: boolean }) {
  const { actions } = useOpenModel();
  if (missing.length === 0) {
    return (
      <p className="mt-2 flex items-center gap-1.5 text-small text-good" role="status">
        <Icon of={Check} size={13} /> Complete: it has every mandatory member of its type.
      </p>
    );
  }
  const addable = missing.filter((member) => !member.isPlaceholder);
  return (
    <div className="mt-3" role="group" aria-label="What is missing">
      <h3>
        Missing of its type <span className="font-mono font-normal">{missing.length}</span>
      </h3>
      <ul className="max-h-40 overflow-y-auto text-small text-ink-2">
        {missing.slice(0, MOST_MISSING).map((member) => (
          <li key={member.pathKey}>
            {formatPath(member)}
            {member.isPlaceholder ? <span className="text-ink-3"> stands for one or more, which you name</span> : null}
          </li>
        ))}
        {missing.length > MOST_MISSING ? (
          <li className="text-ink-3">and {missing.length - MOST_MISSING} more</li>
        ) : null}
      </ul>
      {readOnly || addable.length === 0 ? null : (
        <Button size="small" className="mt-1.5" onClick={() => actions.addMissingMembers(node.key)}>
          Add what is missing
        </Button>
      )}
    </div>
  );
}

function formatPath(member: OpenMember): string {
  return member.path.map((name) => name.name).join(" / ");
}
