import { Form, useNavigation } from "react-router";
import { Button } from "~/components/ui/button";
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
  /** False for a model from before, which stands on working states. */
  isHeld: boolean;
  preview: RevisionPreview | null;
  refusal: string | undefined;
  editBlockedBy: string | undefined;
};

/** Machines are made in one go, and later follow their type in one go. */
export function RollOutPage({ space, clientId, pins, isHeld, preview, refusal, editBlockedBy }: Props) {
  return (
    <Page title="Roll-out" about="Many machines of one type in one go. The type stays as it is.">
      {refusal ? <Notice tone="error" title={refusal} live className="mb-4" /> : null}
      {isHeld ? null : <HoldNotice editBlockedBy={editBlockedBy} />}
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

function HoldNotice({ editBlockedBy }: { editBlockedBy: string | undefined }) {
  const busy = useNavigation().formData?.has("hold") === true;
  return (
    <Notice
      tone="hint"
      title="These machines follow every edit of their types"
      className="mb-6"
      action={
        <Form method="post">
          <input type="hidden" name="hold" value="yes" />
          <Button type="submit" busy={busy} blockedBy={editBlockedBy}>
            Hold them at a frozen revision
          </Button>
        </Form>
      }
    >
      The types are frozen as they are now, and the machines change only when you take a newer revision.
    </Notice>
  );
}
