import { Check, X } from "lucide-react";
import { TEST_SERVER_STAGES, type TestServerState } from "~/domain/simulation/test-server-state";
import { cx } from "../ui/cx";
import { Icon } from "../ui/icon";
import { Progress } from "../ui/progress";
import { useNow } from "./live-context";

/** The steps between the press and the running server, each with its mark. */
export function StageList({ server, onCancel }: { server: TestServerState; onCancel?: (() => void) | undefined }) {
  const now = useNow(200);
  const at = TEST_SERVER_STAGES.findIndex((stage) => stage.id === server.stage);
  const current = TEST_SERVER_STAGES[at];
  const seconds = now > 0 ? Math.max(0, (now - Date.parse(server.startedAt)) / 1000) : 0;
  const hasFailed = server.state === "failed";
  return (
    <div className="max-w-160">
      {current && !hasFailed ? (
        <Progress stage={current.label} done={(at + 0.5) / TEST_SERVER_STAGES.length} figure={`${at + 1} of ${TEST_SERVER_STAGES.length}, ${seconds.toFixed(1)} s`} onCancel={onCancel} />
      ) : null}
      <ol className="mt-2 grid gap-0.5 text-small">
        {TEST_SERVER_STAGES.map((stage, index) => (
          <li key={stage.id} className={cx("flex h-6 items-center gap-2", index > at && "text-ink-3", index === at && !hasFailed && "font-semibold")}>
            <span className="grid size-4 place-items-center">
              {index < at ? <Icon of={Check} size={13} label="done" /> : null}
              {index === at && hasFailed ? (
                <span className="text-error">
                  <Icon of={X} size={13} label="failed here" />
                </span>
              ) : null}
              {index === at && !hasFailed ? <span className="size-1.5 bg-copper" /> : null}
            </span>
            {stage.label}
          </li>
        ))}
      </ol>
    </div>
  );
}
