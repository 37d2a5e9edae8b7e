import { CalendarClock, X } from "lucide-react";
import { Form } from "react-router";
import type { AsBuiltPage } from "~/presenters/as-built-page.server";
import { StatusBadge } from "../notation/status-badge";
import { LocalTime } from "../shell/local-time";
import { Button, LinkButton } from "../ui/button";
import { Field, Select } from "../ui/field";
import { Block } from "../ui/page";
import { Table, TableScroll, Td, Th, Tr } from "../ui/table";

const PERIODS = [
  { minutes: 15, text: "15 minutes" },
  { minutes: 60, text: "hour" },
  { minutes: 360, text: "6 hours" },
  { minutes: 1_440, text: "day" },
  { minutes: 10_080, text: "week" },
] as const;

const STATUS: Readonly<Record<string, "good" | "bad" | "uncertain">> = { "as released": "good", differs: "bad" };

type Props = {
  schedules: AsBuiltPage["schedules"];
  endpoints: readonly { readonly id: string; readonly name: string }[];
  blockedBy: string | undefined;
};

/** Reports that are made again and again, each of the newest release or revision. */
export function Schedules({ schedules, endpoints, blockedBy }: Props) {
  return (
    <Block title="On a schedule" about="against the newest release, or the newest revision where there is none; a mail goes out when the verdict changes">
      {schedules.length === 0 ? <p className="border-t border-ink py-2 text-small text-ink-2">No endpoint is compared on a schedule.</p> : <ScheduleTable schedules={schedules} blockedBy={blockedBy} />}
      {endpoints.length === 0 ? (
        <p className="mt-3 text-small text-ink-2">
          A schedule needs an endpoint: test servers come and go. <LinkButton to="/live/endpoints">Endpoints</LinkButton>
        </p>
      ) : (
        <Form method="post" className="mt-3 flex flex-wrap items-end gap-3">
          <input type="hidden" name="intent" value="schedule" />
          <Field label="Endpoint" className="w-64">
            {(tied) => (
              <Select {...tied} name="endpointId">
                {endpoints.map(({ id, name }) => (
                  <option key={id} value={id}>
                    {name}
                  </option>
                ))}
              </Select>
            )}
          </Field>
          <Field label="Every" className="w-36">
            {(tied) => (
              <Select {...tied} name="everyMinutes" defaultValue={1_440}>
                {PERIODS.map(({ minutes, text }) => (
                  <option key={minutes} value={minutes}>
                    {text}
                  </option>
                ))}
              </Select>
            )}
          </Field>
          <Button type="submit" icon={CalendarClock} blockedBy={blockedBy}>
            Compare on this schedule
          </Button>
        </Form>
      )}
    </Block>
  );
}

function ScheduleTable({ schedules, blockedBy }: Pick<Props, "schedules" | "blockedBy">) {
  return (
    <TableScroll label="Schedules">
      <Table caption="Schedules by endpoint">
        <thead>
          <tr>
            <Th>Endpoint</Th>
            <Th>Every</Th>
            <Th>Last verdict</Th>
            <Th>Last</Th>
            <Th>Next</Th>
            <Th>
              <span className="sr-only">Remove</span>
            </Th>
          </tr>
        </thead>
        <tbody>
          {schedules.map((schedule) => (
            <Tr key={schedule.id}>
              <Td>{schedule.endpoint}</Td>
              <Td>{PERIODS.find(({ minutes }) => minutes === schedule.everyMinutes)?.text ?? `${schedule.everyMinutes} minutes`}</Td>
              <Td>{schedule.lastVerdict === null ? "–" : <StatusBadge status={STATUS[schedule.lastVerdict] ?? "uncertain"}>{schedule.lastVerdict}</StatusBadge>}</Td>
              <Td className="text-ink-2">{schedule.lastAt === null ? "–" : <LocalTime iso={schedule.lastAt} />}</Td>
              <Td className="text-ink-2">
                <LocalTime iso={schedule.nextAt} />
              </Td>
              <Td right>
                <Form method="post">
                  <input type="hidden" name="intent" value="unschedule" />
                  <input type="hidden" name="id" value={schedule.id} />
                  <Button type="submit" icon={X} aria-label={`Remove the schedule of ${schedule.endpoint}`} blockedBy={blockedBy} />
                </Form>
              </Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </TableScroll>
  );
}
