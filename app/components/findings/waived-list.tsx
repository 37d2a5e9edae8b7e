import { useState } from "react";
import type { WaivedFinding } from "~/components/model/finding-store";
import { FindingShape } from "~/components/notation/finding-badge";
import { Button } from "~/components/ui/button";
import { Notice } from "~/components/ui/notice";
import { Block } from "~/components/ui/page";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { getFindingId } from "./group-findings";

type Props = {
  waived: readonly WaivedFinding[];
  reopen: ((waiverId: string) => Promise<string | undefined>) | undefined;
};

/** Findings that somebody accepted: what, why, who, when. */
export function WaivedList({ waived, reopen }: Props) {
  const [refusal, setRefusal] = useState<string | undefined>(undefined);
  if (waived.length === 0) return null;
  return (
    <Block title="Accepted" about={<span className="font-mono">{waived.length}</span>} className="mt-8">
      {refusal ? <Notice tone="error" title={refusal} live className="mb-2" /> : null}
      <TableScroll label="Accepted findings">
        <Table caption="Accepted findings">
          <thead>
            <tr>
              <Th>Rule</Th>
              <Th>Where</Th>
              <Th>Finding</Th>
              <Th>Reason</Th>
              <Th>By</Th>
              <Th>On</Th>
              <Th>
                <span className="sr-only">Take back</span>
              </Th>
            </tr>
          </thead>
          <tbody>
            {waived.map(({ finding, waiver }) => (
              <Tr key={getFindingId(finding)}>
                <Td mono className="whitespace-nowrap">
                  <span className="flex items-center gap-1.5">
                    <FindingShape severity={finding.severity} /> {finding.rule}
                  </span>
                </Td>
                <Td className="font-semibold">{finding.browseName || "Model"}</Td>
                <Td className="text-ink-2">{finding.message}</Td>
                <Td>{waiver.reason}</Td>
                <Td className="whitespace-nowrap">{waiver.person}</Td>
                <Td mono className="text-note whitespace-nowrap text-ink-2">
                  {waiver.date.slice(0, 10)}
                </Td>
                <Td right>
                  {reopen ? (
                    <Button size="small" onClick={() => void reopen(waiver.id).then(setRefusal)}>
                      Take back
                    </Button>
                  ) : null}
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
    </Block>
  );
}
