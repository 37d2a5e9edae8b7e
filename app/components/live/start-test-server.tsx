import { Play, TriangleAlert } from "lucide-react";
import { useState } from "react";
import { Form, useNavigation } from "react-router";
import { TEST_SERVER_STAGES } from "~/domain/simulation/test-server-state";
import { Button } from "../ui/button";
import { Checkbox } from "../ui/field";
import { Icon } from "../ui/icon";
import { Progress } from "../ui/progress";
import { Segments } from "../ui/segments";

/** Starts a test server with one press; the choices below it are for those who need them. */
export function StartTestServer({ mayRun, isAgain, hasMachines }: { mayRun: boolean; isAgain: boolean; hasMachines: boolean }) {
  const navigation = useNavigation();
  const [isOpen, setOpen] = useState(false);
  const isStarting = navigation.state !== "idle" && navigation.formData?.get("intent") === "start";
  return (
    <Form method="post" className="grid gap-3">
      <input type="hidden" name="intent" value="start" />
      <div>
        <Button
          type="submit"
          tone={isAgain ? "plain" : "main"}
          size="large"
          icon={Play}
          busy={isStarting}
          blockedBy={mayRun ? undefined : "Your roles do not start test servers"}
        >
          {isAgain ? "Start another" : "Start test server"}
        </Button>
      </div>
      {hasMachines ? (
        <div className="flex flex-wrap items-center gap-2 text-small">
          <span className="text-ink-2">Values</span>
          <Segments
            label="Values"
            name="values"
            value="simulated"
            options={[
              { value: "simulated", label: "Simulated" },
              { value: "live", label: "From the live sources, through the mapping" },
            ]}
          />
        </div>
      ) : null}
      {isStarting ? <Progress stage={TEST_SERVER_STAGES[0].label} figure={`1 of ${TEST_SERVER_STAGES.length}`} className="max-w-160" /> : null}
      <details className="text-small">
        <summary className="w-fit text-ink-2">Security and status</summary>
        <div className="mt-2 grid gap-3 border-l border-rule pl-4">
          <p className="text-ink-2">Basic256Sha256, Aes128_Sha256_RsaOaep and Aes256_Sha256_RsaPss with Sign and SignAndEncrypt; anonymous, or a user whose password is shown once it runs. Only this host reaches it.</p>
          <Checkbox
            name="open"
            value="1"
            label="Also without protection (security policy None)"
            hint="For clients that know nothing else."
            onChange={(event) => setOpen(event.target.checked)}
          />
          {isOpen ? (
            <p className="flex items-center gap-2 text-warning">
              <Icon of={TriangleAlert} size={14} /> Unprotected connection. Bench use only.
            </p>
          ) : null}
          <div className="flex flex-wrap items-center gap-2">
            <span className="text-ink-2">Status of simulated values</span>
            <Segments
              label="Status of simulated values"
              name="simulatedQuality"
              value="uncertain"
              options={[
                { value: "uncertain", label: "Uncertain_SimulatedValue" },
                { value: "good", label: "Good" },
              ]}
            />
          </div>
        </div>
      </details>
    </Form>
  );
}
