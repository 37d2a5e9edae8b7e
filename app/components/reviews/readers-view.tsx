import { useState } from "react";
import { Form, useNavigation } from "react-router";
import { Button } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Field, Input, TextArea } from "~/components/ui/field";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import { RowHead, Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { ReaderLine } from "~/presenters/readers.server";
import { formatCount } from "~/utils/format";

type Props = { readers: readonly ReaderLine[]; mayEdit: boolean; errors: readonly string[] };

/** Who reads the machines, and what of them: every review asks this. */
export function ReadersView({ readers, mayEdit, errors }: Props) {
  const [editing, setEditing] = useState<ReaderLine>();
  return (
    <Page
      title="Readers"
      about="Consumers of the machines’ data that the team names. A review shows what each change does to them."
    >
      <div className="grid grid-cols-[minmax(0,1fr)_360px] gap-8 max-lg:grid-cols-1">
        <div>
          {readers.length === 0 ? (
            <Empty title="No reader yet">
              The energy board, the maintenance planner, a trend page: name each with the NodeIds that it reads.
            </Empty>
          ) : (
            <TableScroll label="Readers">
              <Table caption="Readers with the nodes that they read">
                <thead>
                  <tr>
                    <Th>Reader</Th>
                    <Th>About</Th>
                    <Th>Who to tell</Th>
                    <Th right>Nodes</Th>
                    <Th>
                      <span className="sr-only">Change it</span>
                    </Th>
                  </tr>
                </thead>
                <tbody>
                  {readers.map((reader) => (
                    <Tr key={reader.id}>
                      <RowHead>{reader.name}</RowHead>
                      <Td>{reader.about}</Td>
                      <Td>{reader.contact}</Td>
                      <Td right mono>
                        {formatCount(reader.nodeIds.length)}
                      </Td>
                      <Td right>
                        {mayEdit ? (
                          <Button size="small" tone="bare" onClick={() => setEditing(reader)}>
                            Change
                          </Button>
                        ) : null}
                      </Td>
                    </Tr>
                  ))}
                </tbody>
              </Table>
            </TableScroll>
          )}
        </div>
        <ReaderForm
          key={`${editing?.id ?? "new"} ${readers.length}`}
          reader={editing}
          mayEdit={mayEdit}
          errors={errors}
          onDone={() => setEditing(undefined)}
        />
      </div>
    </Page>
  );
}

function ReaderForm({
  reader,
  mayEdit,
  errors,
  onDone,
}: {
  reader: ReaderLine | undefined;
  mayEdit: boolean;
  errors: readonly string[];
  onDone: () => void;
}) {
  const busy = useNavigation().state === "submitting";
  return (
    <Block
      title={reader ? `Change ${reader.name}` : "Name a reader"}
      className="content-start border-t-[1.5px] border-ink pt-2"
    >
      <Form method="post" className="grid gap-3">
        {reader ? <input type="hidden" name="id" value={reader.id} /> : null}
        {errors.length > 0 ? <Notice tone="error" title={errors.join(" ")} live /> : null}
        <Field label="Name">
          {(control) => (
            <Input
              {...control}
              name="name"
              required
              maxLength={100}
              defaultValue={reader?.name}
              placeholder="Energy board"
            />
          )}
        </Field>
        <Field label="About" optional>
          {(control) => (
            <Input
              {...control}
              name="about"
              maxLength={1000}
              defaultValue={reader?.about}
              placeholder="Shows the works’ power"
            />
          )}
        </Field>
        <Field label="Who to tell" optional>
          {(control) => (
            <Input
              {...control}
              name="contact"
              maxLength={320}
              defaultValue={reader?.contact}
              placeholder="energy@merrow.example"
            />
          )}
        </Field>
        <Field label="Nodes that it reads" hint="One NodeId a line, with nsu=. What lies below a node counts too.">
          {(control) => (
            <TextArea {...control} name="nodeIds" mono rows={8} defaultValue={reader?.nodeIds.join("\n")} />
          )}
        </Field>
        <div className="flex gap-2">
          <Button type="submit" tone="main" busy={busy} blockedBy={mayEdit ? undefined : "asks for a role"}>
            {reader ? "Save" : "Add"}
          </Button>
          {reader ? (
            <>
              <Button onClick={onDone}>Cancel</Button>
              <Button type="submit" tone="danger" name="intent" value="remove" formNoValidate>
                Remove
              </Button>
            </>
          ) : null}
        </div>
      </Form>
    </Block>
  );
}
