import { Link } from "react-router";
import { LocalTime } from "~/components/shell/local-time";
import { Block } from "~/components/ui/page";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { ReviewLine } from "~/services/read-review.server";

const states: Readonly<Record<ReviewLine["state"], string>> = {
  open: "open",
  approved: "approved",
  "changes-wanted": "changes wanted",
  released: "released",
  closed: "closed",
};

/** Reviews that are not decided; those that wait for the reader say so. */
export function ReviewTable({ reviews }: { reviews: readonly ReviewLine[] }) {
  return (
    <Block title="Open reviews">
      {reviews.length === 0 ? (
        <p className="border-t border-ink pt-2 text-small text-ink-2">None. A review is asked for on the page of a model’s revisions.</p>
      ) : (
        <TableScroll label="Open reviews">
          <Table caption="Open reviews">
            <thead>
              <tr>
                <Th right className="w-10">
                  No.
                </Th>
                <Th>Subject</Th>
                <Th>Model</Th>
                <Th>From</Th>
                <Th>State</Th>
                <Th>Asked</Th>
              </tr>
            </thead>
            <tbody>
              {reviews.map((review) => (
                <Tr key={review.id}>
                  <Td right mono>
                    {review.number}
                  </Td>
                  <Td>
                    <Link to={`/reviews/${review.id}`} className="font-semibold hover:text-copper">
                      {review.title}
                    </Link>
                  </Td>
                  <Td className="text-ink-2">
                    {review.model} <span className="font-mono text-note">r{review.revision}</span>
                  </Td>
                  <Td className="text-ink-2">{review.author}</Td>
                  <Td>{review.waitsForMe ? <b className="font-semibold text-copper">waits for you</b> : states[review.state]}</Td>
                  <Td mono className="whitespace-nowrap text-note text-ink-2">
                    <LocalTime iso={review.askedAt} parts="date" />
                  </Td>
                </Tr>
              ))}
            </tbody>
          </Table>
        </TableScroll>
      )}
    </Block>
  );
}
