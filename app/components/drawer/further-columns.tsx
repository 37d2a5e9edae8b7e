import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Node } from "~/domain/address-space/node";
import { AttributesColumn } from "./attributes-column";
import { HistoryColumn } from "./history-column";
import { PermissionsColumn } from "./permissions-column";
import { RawColumn } from "./raw-column";

/** What is asked for less often: the other attributes, who may do what, XML of its own, history. */
export function FurtherColumns(props: { space: AddressSpace; node: Node; readOnly: boolean }) {
  return (
    <div className="particulars is-further">
      <AttributesColumn {...props} />
      <PermissionsColumn {...props} />
      <RawColumn {...props} />
      <HistoryColumn {...props} />
    </div>
  );
}
