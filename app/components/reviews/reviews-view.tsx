import { Form, Link, useNavigation } from "react-router";
import { LocalTime } from "~/components/shell/local-time";
import { Button, LinkButton } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Checkbox, Field, Input, Select } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { Tag } from "~/components/ui/tag";
import { ReleasesTable } from "~/components/releases/releases-table";
import type { ReleaseSummary } from "~/services/read-release.server";
import type { ReviewChoices, ReviewLine } from "~/services/read-review.server";
import { stateWords } from "./review-words";

type Props = {
  reviews: readonly ReviewLine[];
  releases: readonly ReleaseSummary[];
  choices: ReviewChoices;
  blockedBy: string | undefined;
  chosenModel: string | undefined;
  errors: readonly string[];
};

export function ReviewsView({ reviews, releases, choices, blockedBy, chosenModel, errors }: Props) {
  const running = reviews.filter((review) => review.state !== "released" && review.state !== "closed");
  const over = reviews.filter((review) => !running.includes(review));
  return (
    <Page
      title="Reviews"
      about="No version goes out before somebody else has looked at what it means."
      actions={<LinkButton to="/readers">Readers</LinkButton>}
    >
      <div className="grid grid-cols-[minmax(0,1fr)_320px] gap-8 max-lg:grid-cols-1">
        <div className="grid content-start gap-8">
          <Block title="Running" about={<span className="font-mono">{running.length}</span>}>
            {running.length === 0 ? (
              <Empty title="No review runs">
                Ask for one at the right: the working state is frozen, and those you name get a mail.
              </Empty>
            ) : (
              <ReviewTable reviews={running} caption="Running reviews" />
            )}
          </Block>
          {releases.length > 0 ? (
            <Block title="Releases" about={<span className="font-mono">{releases.length}</span>}>
              <ReleasesTable releases={releases} />
            </Block>
          ) : null}
          {over.length > 0 ? (
            <Block title="Over" about={<span className="font-mono">{over.length}</span>}>
              <ReviewTable reviews={over} caption="Reviews that are over" />
            </Block>
          ) : null}
        </div>
        <AskForm choices={choices} blockedBy={blockedBy} chosenModel={chosenModel} errors={errors} />
      </div>
    </Page>
  );
}

function ReviewTable({ reviews, caption }: { reviews: readonly ReviewLine[]; caption: string }) {
  return (
    <TableScroll label={caption}>
      <Table caption={caption}>
        <thead>
          <tr>
            <Th right className="w-10">
              No.
            </Th>
            <Th>Review</Th>
            <Th>Model</Th>
            <Th>State</Th>
            <Th>Asked by</Th>
            <Th>Reviewers</Th>
          </tr>
        </thead>
        <tbody>
          {reviews.map((review) => (
            <Tr key={review.id}>
              <Td right mono>
                {review.number}
              </Td>
              <RowHead>
                <Link to={`/reviews/${review.id}`} className="hover:text-copper">
                  {review.title}
                </Link>
                {review.waitsForMe ? (
                  <Tag tone="copper" className="ml-2">
                    your turn
                  </Tag>
                ) : null}
              </RowHead>
              <Td>
                {review.model} <span className="font-mono text-note text-ink-3">r{review.revision}</span>
              </Td>
              <Td>
                <Tag tone="ink">{stateWords[review.state]}</Tag>
              </Td>
              <Td className="whitespace-nowrap">
                {review.author}, <LocalTime iso={review.askedAt} parts="date" />
              </Td>
              <Td>
                {review.reviewers
                  .map(({ name, decision }) =>
                    decision === null ? name : `${name} (${decision === "approved" ? "approves" : "wants changes"})`,
                  )
                  .join(", ")}
              </Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}

function AskForm({
  choices,
  blockedBy,
  chosenModel,
  errors,
}: Pick<Props, "choices" | "blockedBy" | "chosenModel" | "errors">) {
  const busy = useNavigation().formData?.get("intent") === "ask";
  return (
    <Block title="Ask for a review" className="content-start border-t-[1.5px] border-ink pt-2">
      <Form method="post" className="grid gap-3">
        <input type="hidden" name="intent" value="ask" />
        {errors.length > 0 ? <Notice tone="error" title={errors.join(" ")} live /> : null}
        <Field label="Model">
          {(control) => (
            <Select {...control} name="modelId" defaultValue={chosenModel}>
              {choices.models.map((model) => (
                <option key={model.id} value={model.id}>
                  {model.name}
                </option>
              ))}
            </Select>
          )}
        </Field>
        <Field label="What it is about">
          {(control) => (
            <Input {...control} name="title" required maxLength={200} placeholder="Gearbox condition, autumn round" />
          )}
        </Field>
        <fieldset className="grid gap-1.5">
          <legend className="pb-1 text-note font-medium text-ink-2">Reviewers</legend>
          {choices.reviewers.map((person) => (
            <Checkbox key={person.id} name="reviewers" value={person.id} label={person.name} />
          ))}
          {choices.reviewers.length === 0 ? (
            <p className="text-small text-ink-2">Nobody else may approve yet; an administrator gives the role.</p>
          ) : null}
        </fieldset>
        <Button type="submit" tone="main" busy={busy} blockedBy={blockedBy} className="justify-self-start">
          Ask for a review
        </Button>
      </Form>
    </Block>
  );
}
