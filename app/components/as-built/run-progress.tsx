import { useEffect, useState } from "react";
import { useNavigate, useRevalidator } from "react-router";
import { Notice } from "../ui/notice";
import { Progress } from "../ui/progress";

type Run = { state: "running" | "done" | "failed"; stage: "connect" | "browse" | "watch" | "compare" | "done"; done: number; of: number; reportId: string | null; problems: { message: string }[] };

const STAGES = { connect: "Connecting", browse: "Reading the address space", watch: "Watching the values", compare: "Comparing", done: "Done" } as const;
const ASK_EVERY = 500;

/** How far a run is; its report opens when it is there. */
export function RunProgress({ runId }: { runId: string }) {
  const [run, setRun] = useState<Run>();
  const navigate = useNavigate();
  const { revalidate } = useRevalidator();
  useEffect(() => {
    let isGone = false;
    const ask = async (): Promise<void> => {
      const answer = await fetch(`/api/v1/as-built-runs/${runId}`).catch(() => undefined);
      if (isGone) return;
      const next = answer?.ok ? ((await answer.json()) as Run) : undefined;
      if (next) setRun(next);
      if (next?.state === "done" && next.reportId) void navigate(`/as-built/${next.reportId}`);
      else if (next?.state === "failed") void revalidate();
      else setTimeout(() => void ask(), ASK_EVERY);
    };
    void ask();
    return () => {
      isGone = true;
    };
  }, [runId, navigate, revalidate]);
  if (run?.state === "failed") return <Notice tone="error" live title={run.problems.map((problem) => problem.message).join(" ")} />;
  const share = run && run.of > 0 ? run.done / run.of : 0;
  return <Progress stage={STAGES[run?.stage ?? "connect"]} done={share} />;
}
