import { MoreVertical } from "lucide-react";
import { useState } from "react";
import { Form } from "react-router";
import type { TeamPage } from "~/presenters/team-page.server";
import { LocalTime } from "~/components/shell/local-time";
import { Button, IconButton } from "~/components/ui/button";
import { Dialog, DialogClose } from "~/components/ui/dialog";
import { Field, Input } from "~/components/ui/field";
import { Initials } from "~/components/ui/initials";
import { Menu } from "~/components/ui/menu";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import { Tag } from "~/components/ui/tag";
import { RoleBoxes } from "./role-boxes";

type Person = TeamPage["people"][number];
type Change = { kind: "roles" | "password" | "remove"; person: Person };

export function PeopleTable({
  people,
  userId,
  mayAdminister,
}: {
  people: readonly Person[];
  userId: string;
  mayAdminister: boolean;
}) {
  const [change, setChange] = useState<Change | undefined>(undefined);
  const close = () => setChange(undefined);
  return (
    <>
      <TableScroll label="People">
        <Table caption="People of the organisation">
          <thead>
            <tr>
              <Th>Name</Th>
              <Th>E-mail</Th>
              <Th>Roles</Th>
              <Th>Here since</Th>
              {mayAdminister ? (
                <Th className="w-8">
                  <span className="sr-only">Actions</span>
                </Th>
              ) : null}
            </tr>
          </thead>
          <tbody>
            {people.map((person) => (
              <Tr key={person.id}>
                <Td className="h-9">
                  <span className="flex items-center gap-2">
                    <Initials name={person.name} small tone={person.id === userId ? "me" : "plain"} />
                    <b className="font-semibold">{person.name}</b>
                    {person.id === userId ? <span className="text-note text-ink-3">you</span> : null}
                  </span>
                </Td>
                <Td mono className="text-ink-2">
                  {person.email}
                </Td>
                <Td>
                  <span className="flex flex-wrap gap-1">
                    {person.roles.map((role) => (
                      <Tag key={role}>{role}</Tag>
                    ))}
                  </span>
                </Td>
                <Td mono className="text-ink-2">
                  <LocalTime iso={person.since} parts="date" />
                </Td>
                {mayAdminister ? (
                  <Td right>
                    <Menu
                      label={`Change ${person.name}`}
                      align="end"
                      trigger={<IconButton icon={MoreVertical} label={`Change ${person.name}`} size="small" />}
                      entries={[
                        { label: "Roles", onSelect: () => setChange({ kind: "roles", person }) },
                        { label: "New password", onSelect: () => setChange({ kind: "password", person }) },
                        { kind: "rule" },
                        {
                          label: "Remove",
                          danger: true,
                          disabled: person.id === userId,
                          ...(person.id === userId ? { note: "not yourself" } : {}),
                          onSelect: () => setChange({ kind: "remove", person }),
                        },
                      ]}
                    />
                  </Td>
                ) : null}
              </Tr>
            ))}
          </tbody>
        </Table>
      </TableScroll>
      {change ? <ChangeDialog key={`${change.kind} ${change.person.id}`} change={change} onClose={close} /> : null}
    </>
  );
}

const titles: Record<Change["kind"], (name: string) => string> = {
  roles: (name) => `Roles of ${name}`,
  password: (name) => `New password for ${name}`,
  remove: (name) => `Remove ${name}?`,
};
const abouts: Record<Change["kind"], string> = {
  roles: "One of several roles is enough for what it allows.",
  password: "Their sessions end at once. Tell them the password on a safe way; they can ask for another here.",
  remove: "Their sessions and tokens end at once. What they edited stays, with their name.",
};

function ChangeDialog({ change, onClose }: { change: Change; onClose: () => void }) {
  const { kind, person } = change;
  return (
    <Dialog
      title={titles[kind](person.name)}
      about={abouts[kind]}
      open
      onOpenChange={(open) => (open ? undefined : onClose())}
    >
      <Form method="post" className="grid gap-4" onSubmit={() => setTimeout(onClose)}>
        <input
          type="hidden"
          name="intent"
          value={{ roles: "set-roles", password: "set-password", remove: "remove-person" }[kind]}
        />
        <input type="hidden" name="userId" value={person.id} />
        {kind === "roles" ? <RoleBoxes held={person.roles} /> : null}
        {kind === "password" ? (
          <Field label="New password" hint="At least 10 characters.">
            {(tied) => (
              <Input
                {...tied}
                name="password"
                type="password"
                minLength={10}
                maxLength={128}
                required
                autoComplete="new-password"
              />
            )}
          </Field>
        ) : null}
        <div className="flex justify-end gap-2">
          <DialogClose asChild>
            <Button>Cancel</Button>
          </DialogClose>
          <Button type="submit" tone={kind === "remove" ? "danger" : "ink"}>
            {kind === "remove" ? "Remove" : "Save"}
          </Button>
        </div>
      </Form>
    </Dialog>
  );
}
