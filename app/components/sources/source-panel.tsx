import { Trash2 } from "lucide-react";
import { FindingShape } from "~/components/notation/finding-badge";
import { Button } from "~/components/ui/button";
import { Dialog, DialogClose } from "~/components/ui/dialog";
import type { SourceView } from "~/services/read-sources.server";
import { SourceForm } from "./source-form";
import type { SourceFinding } from "~/services/list-source-findings.server";
import type { SourceActions } from "./use-source-actions";

type Props = {
  source: SourceView | undefined;
  findings: readonly SourceFinding[];
  actions: SourceActions;
  onDone: () => void;
};

/** A source as a whole: its address, and the way to remove it. */
export function SourcePanel({ source, findings, actions, onDone }: Props) {
  return (
    <div className="grid grid-cols-[minmax(440px,2fr)_minmax(280px,1fr)] divide-x divide-rule">
      <section aria-label="Address" className="px-5 py-2.5">
        <SourceForm key={source?.id ?? "new"} source={source} actions={actions} onDone={onDone} />
      </section>
      <section aria-label="Facts" className="grid content-start gap-2 px-5 py-2.5">
        {findings.map((finding) => (
          <p key={`${finding.rule} ${finding.message}`} className="flex items-start gap-1.5 text-small">
            <span className="pt-0.5">
              <FindingShape severity={finding.severity} />
            </span>
            <span>
              <span className="font-mono text-note text-ink-3">{finding.rule}</span> {finding.message}
            </span>
          </p>
        ))}
        {source ? (
          <RemoveSource source={source} actions={actions} onDone={onDone} />
        ) : (
          <p className="text-small text-ink-2">
            A master shows its ports as a picture; units and servers stand in the tables below.
          </p>
        )}
      </section>
    </div>
  );
}

function RemoveSource({ source, actions, onDone }: { source: SourceView; actions: SourceActions; onDone: () => void }) {
  const bound = source.bindings.length + source.ports.reduce((sum, port) => sum + port.bindings.length, 0);
  return (
    <div className="grid justify-items-start gap-2 text-small text-ink-2">
      <p>
        <span className="font-mono">{bound}</span> {bound === 1 ? "role of a machine reads" : "roles of machines read"}{" "}
        it.
      </p>
      {actions.blockedBy === undefined ? (
        <Dialog
          title={`Remove ${source.name}?`}
          about={
            bound > 0
              ? `${bound} roles of machines would be bound to nothing; the checker will say so.`
              : "The plan of its ports goes with it."
          }
          trigger={
            <Button size="small" icon={Trash2}>
              Remove the source
            </Button>
          }
        >
          <div className="flex justify-end gap-2">
            <DialogClose asChild>
              <Button>Keep it</Button>
            </DialogClose>
            <DialogClose asChild>
              <Button
                tone="danger"
                onClick={() =>
                  void actions.send({ intent: "remove-source", id: source.id }).then((done) => done && onDone())
                }
              >
                Remove
              </Button>
            </DialogClose>
          </div>
        </Dialog>
      ) : null}
    </div>
  );
}
