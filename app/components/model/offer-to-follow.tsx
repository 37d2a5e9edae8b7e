/** After an edit of a type: what was made from it and does not follow yet, with one press to bring it in line. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { listConsequences, type Consequence } from "~/domain/instantiation/consequences";
import { Button } from "../ui/button";
import { showToast } from "../ui/toast";
import { describeConsequences } from "./describe-consequences";

/** Going through more would be felt; the findings name what is missing there. */
const MOST_NODES = 20_000;

let closeLast = (): void => undefined;

/** Asked when the edit is on screen, since it goes through all copies. */
export function offerToFollow(before: AddressSpace, after: AddressSpace, follow: (consequences: readonly Consequence[]) => void): void {
  if (after.own.nodes.size > MOST_NODES) return;
  setTimeout(() => {
    const consequences = listConsequences(before, after);
    if (consequences.length === 0) return;
    closeLast();
    const close = showToast({
      tone: "plain",
      title: "Copies of this type do not follow yet",
      detail: describeConsequences(after, consequences),
      seconds: 20,
      action: (
        <Button
          size="small"
          onClick={() => {
            close();
            follow(consequences);
          }}
        >
          Update them
        </Button>
      ),
    });
    closeLast = close;
  }, 0);
}
