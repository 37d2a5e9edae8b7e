import { formatProblem } from "~/domain/core/problem-texts";
import type { Problem } from "~/domain/core/result";
import type { LogLine, TestServerState } from "~/domain/simulation/test-server-state";
import { Notice } from "../ui/notice";
import { Page } from "../ui/page";
import { StartTestServer } from "./start-test-server";
import { TestServerPanel } from "./test-server-panel";

type Props = {
  servers: readonly { readonly server: TestServerState; readonly log: readonly LogLine[] }[];
  problems: readonly Problem[];
  mayRun: boolean;
  /** A model of machines may be fed by their sources. */
  hasMachines: boolean;
  /** The model's present sequence number. */
  headSeq: number;
};

/** The test servers of a model. */
export function TestServerPage({ servers, problems, mayRun, hasMachines, headSeq }: Props) {
  return (
    <Page title="Test server" about={`An OPC UA server on this host that serves the model as it is now, with simulated values${hasMachines ? ", or with those of the sources" : ""}.`}>
      <div className="grid max-w-240 gap-4">
        {problems.map((problem, index) => (
          <Notice key={index} tone="error" title={formatProblem(problem)} live />
        ))}
        <StartTestServer mayRun={mayRun} hasMachines={hasMachines} isAgain={servers.some(({ server }) => server.state === "running" || server.state === "starting")} />
        {servers.map(({ server, log }) => (
          <TestServerPanel key={server.id} initial={server} initialLog={log} mayRun={mayRun} headSeq={headSeq} />
        ))}
      </div>
    </Page>
  );
}
