import { Plus } from "lucide-react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { getNodeName } from "../model/member-facts";
import { SayInput } from "../model/say-input";
import { Icon } from "../ui/icon";

/** The open line below the table: a name, or what the member carries, makes the next member. */
export function NewMemberRow({ space, owner }: { space: AddressSpace; owner: NodeKey }) {
  return (
    <div className="register-new">
      <Icon of={Plus} />
      <div className="w-110">
        <SayInput space={space} placeholder={`Type what the next member of ${getNodeName(space, owner)} carries: oil level %`} isBare />
      </div>
    </div>
  );
}
