import { useState, type FormEvent } from "react";
import { Button } from "~/components/ui/button";
import { Field, Input } from "~/components/ui/field";
import type { Finding } from "~/domain/checks/finding";

type Props = { finding: Finding; accept: (finding: Finding, reason: string) => Promise<string | undefined> };

/** Accepting a finding as it is: with a reason, until its node changes. */
export function AcceptFinding({ finding, accept }: Props) {
  const [reason, setReason] = useState("");
  const [busy, setBusy] = useState(false);
  const [refusal, setRefusal] = useState<string | undefined>(undefined);
  const submit = async (event: FormEvent) => {
    event.preventDefault();
    if (reason.trim() === "") return setRefusal("Say why it may stay as it is.");
    setBusy(true);
    setRefusal(await accept(finding, reason.trim()));
    setBusy(false);
  };
  return (
    <form onSubmit={(event) => void submit(event)} className="mt-4 grid gap-1.5 border-t border-hair pt-3">
      <Field
        label="Or accept it, because"
        errors={refusal ? [refusal] : undefined}
        hint="Holds until the node changes."
      >
        {(control) => (
          <Input
            {...control}
            value={reason}
            maxLength={1000}
            onChange={(event) => setReason(event.currentTarget.value)}
          />
        )}
      </Field>
      <span>
        <Button type="submit" size="small" busy={busy}>
          Accept
        </Button>
      </span>
    </form>
  );
}
