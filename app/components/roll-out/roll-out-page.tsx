import { Notice } from "~/components/ui/notice";
import { Page } from "~/components/ui/page";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { PinSummary } from "~/services/pins.server";
import type { RevisionPreview } from "~/services/take-revision.server";
import { RollOutView } from "./roll-out-view";
import { TypeVersion } from "./type-version";

type Props = {
  space: AddressSpace;
  clientId: string;
  pins: readonly PinSummary[];
  preview: RevisionPreview | null;
  refusal: string | undefined;
  editBlockedBy: string | undefined;
};

/** Machines are made in one go, and later follow their type in one go. */
export function RollOutPage({ space, clientId, pins, preview, refusal, editBlockedBy }: Props) {
  return (
    <Page title="Roll-out" about="Many machines of one type in one go. The type stays as it is.">
      {refusal ? <Notice tone="error" title={refusal} live className="mb-4" /> : null}
      {pins.map((pin) => (
        <TypeVersion
          key={`${pin.modelUri} ${preview?.to ?? ""}`}
          pin={pin}
          preview={preview?.modelUri === pin.modelUri ? preview : null}
          clientId={clientId}
          editBlockedBy={editBlockedBy}
        />
      ))}
      <RollOutView space={space} editBlockedBy={editBlockedBy} />
    </Page>
  );
}
