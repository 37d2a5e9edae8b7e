import type { Severity } from "~/domain/core/result";
import { FindingShape } from "~/components/notation/finding-badge";
import { Table, Td, Th } from "~/components/ui/table";

/** A problem as the server words it. */
export type ShownProblem = {
  readonly code: string;
  readonly severity: Severity;
  readonly message: string;
  readonly line?: number | undefined;
  readonly column?: number | undefined;
};

/** Problems with their places in the file. */
export function ProblemList({ problems, caption }: { problems: readonly ShownProblem[]; caption: string }) {
  const hasPlaces = problems.some((problem) => problem.line !== undefined);
  return (
    <Table caption={caption}>
      <thead>
        <tr>
          <Th className="w-7">
            <span className="sr-only">Severity</span>
          </Th>
          {hasPlaces ? (
            <Th right className="w-24">
              Line : column
            </Th>
          ) : null}
          <Th>Problem</Th>
          <Th>Code</Th>
        </tr>
      </thead>
      <tbody>
        {problems.map((problem, i) => (
          <tr key={`${problem.code} ${problem.line ?? ""} ${i}`} className="align-top">
            <Td className="pt-1.5">
              <FindingShape severity={problem.severity} />
              <span className="sr-only">{problem.severity}</span>
            </Td>
            {hasPlaces ? (
              <Td right mono className="pt-1.5 text-ink-2">
                {problem.line === undefined ? "" : `${problem.line} : ${problem.column ?? 1}`}
              </Td>
            ) : null}
            <Td className="py-1.5">{problem.message}</Td>
            <Td mono className="pt-1.5 text-note text-ink-3">
              {problem.code}
            </Td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
