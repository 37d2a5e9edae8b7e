import { Form } from "react-router";
import type { AllowanceSummary } from "~/presenters/endpoints-page.server";
import { Button } from "../ui/button";
import { Field, Input } from "../ui/field";
import { Block } from "../ui/page";
import { Table, TableScroll, Td, Th, Tr } from "../ui/table";

/** The administrator's list of hosts and ports; nothing else can be reached through the application. */
export function AllowedPlaces({ allowances, isAdministrator }: { allowances: readonly AllowanceSummary[]; isAdministrator: boolean }) {
  return (
    <Block title="Allowed places" about="Ferrule connects to these hosts and ports, and to nothing else but its own test servers.">
      {allowances.length === 0 ? (
        <p className="border-t border-ink py-2 text-small text-ink-2">
          No place is allowed yet. {isAdministrator ? "Allow the hosts of the shop floor below." : "An administrator allows them here."}
        </p>
      ) : (
        <TableScroll label="Allowed places">
          <Table caption="Allowed places">
            <thead>
              <tr>
                <Th>Host</Th>
                <Th>Ports</Th>
                <Th>For</Th>
                <Th>Allowed by</Th>
                <Th>
                  <span className="sr-only">Take off the list</span>
                </Th>
              </tr>
            </thead>
            <tbody>
              {allowances.map((place) => (
                <Tr key={place.id}>
                  <Td mono>{place.host}</Td>
                  <Td mono>{place.portFrom === place.portTo ? place.portFrom : `${place.portFrom} … ${place.portTo}`}</Td>
                  <Td>{place.note}</Td>
                  <Td className="text-ink-2">{place.addedBy}</Td>
                  <Td right>
                    {isAdministrator ? (
                      <Form method="post">
                        <input type="hidden" name="intent" value="forbid" />
                        <input type="hidden" name="id" value={place.id} />
                        <Button type="submit" size="small" aria-label={`Take ${place.host} off the list`}>
                          Take off
                        </Button>
                      </Form>
                    ) : null}
                  </Td>
                </Tr>
              ))}
            </tbody>
          </Table>
        </TableScroll>
      )}
      {isAdministrator ? (
        <Form method="post" className="mt-3 flex flex-wrap items-end gap-3" key={allowances.length}>
          <input type="hidden" name="intent" value="allow" />
          <Field label="Host" className="w-64">
            {(tied) => <Input {...tied} name="host" mono required placeholder="10.20.0.0/16" autoComplete="off" />}
          </Field>
          <Field label="From port" className="w-28">
            {(tied) => <Input {...tied} name="portFrom" type="number" min={1} max={65535} defaultValue={4840} mono required />}
          </Field>
          <Field label="To port" className="w-28">
            {(tied) => <Input {...tied} name="portTo" type="number" min={1} max={65535} defaultValue={4840} mono required />}
          </Field>
          <Field label="For" optional className="w-64">
            {(tied) => <Input {...tied} name="note" placeholder="gateways of hall 1" />}
          </Field>
          <Button type="submit">Allow</Button>
        </Form>
      ) : null}
    </Block>
  );
}
