import { ArrowLeft, ArrowRight } from "lucide-react";
import type { ReactNode } from "react";
import { FindingShape } from "~/components/notation/finding-badge";
import { LinkButton } from "~/components/ui/button";
import { Block, Page } from "~/components/ui/page";
import { Tag } from "~/components/ui/tag";
import type { RuleHelp, ShownExample } from "~/presenters/rules.server";

/** What a rule asks, what happens where it does not hold, and one example of each kind, checked when the page was made. */
export function RuleHelpView({ help }: { help: RuleHelp }) {
  return (
    <Page
      title={
        <>
          <span className="mr-2 font-mono font-medium text-ink-2">{help.id}</span> {help.title}
        </>
      }
      about={
        <span className="flex items-center gap-1.5">
          <FindingShape severity={help.severity} /> {help.severity}
        </span>
      }
      actions={
        <>
          <LinkButton to="/rules">All rules</LinkButton>
          {help.previous ? (
            <LinkButton to={`/rules/${help.previous}`} icon={ArrowLeft}>
              {help.previous}
            </LinkButton>
          ) : null}
          {help.next ? (
            <LinkButton to={`/rules/${help.next}`} icon={ArrowRight}>
              {help.next}
            </LinkButton>
          ) : null}
        </>
      }
    >
      <dl className="grid max-w-240 grid-cols-[110px_minmax(0,1fr)] gap-x-4 gap-y-2.5 border-t-[1.5px] border-ink pt-3 text-body">
        {help.condition ? <Fact label="Must hold">{help.condition}</Fact> : null}
        {help.why ? <Fact label="If ignored">{help.why}</Fact> : null}
        {help.concerns ? <Fact label="Concerns">{help.concerns}</Fact> : null}
        <Fact label="Clause">
          <Tag>{help.clause}</Tag>
        </Fact>
        {help.implemented ? (
          <Fact label="Mend">{help.fix ?? "By hand, where the node stands."}</Fact>
        ) : (
          <Fact label="Not run">{help.reason}</Fact>
        )}
      </dl>
      <div className="mt-7 grid gap-7 min-[1100px]:grid-cols-2">
        {help.good ? <ExampleBlock title="Good" example={help.good} /> : null}
        {help.bad ? <ExampleBlock title="Bad" example={help.bad} /> : null}
      </div>
      {help.good ? (
        <p className="mt-4 text-note text-ink-3">
          The examples are the rule’s own test data: built, written and checked anew for this page.
        </p>
      ) : null}
    </Page>
  );
}

function Fact({ label, children }: { label: string; children: ReactNode }) {
  return (
    <>
      <dt className="text-note leading-[19px] text-ink-3">{label}</dt>
      <dd>{children}</dd>
    </>
  );
}

function ExampleBlock({ title, example }: { title: "Good" | "Bad"; example: ShownExample }) {
  return (
    <Block title={title} about={example.text} className="min-w-0">
      <Source label={`${title} example as NodeSet2`} text={example.source} />
      {example.wiring ? <Source label={`${title} example: mapping and sources`} text={example.wiring} /> : null}
      {example.findings.length === 0 ? (
        <p className="mt-2 text-small text-ink-2">The rule finds nothing here.</p>
      ) : (
        <ul className="mt-2 grid gap-2">
          {example.findings.map((finding) => (
            <li key={finding.message} className="border-l-[3px] border-copper bg-leaf px-3 py-2 text-small">
              <p className="flex items-start gap-1.5 font-semibold">
                <span className="mt-0.5">
                  <FindingShape severity={finding.severity} />
                </span>
                {finding.message}
              </p>
              {finding.facts.map((fact) => (
                <p key={fact} className="pl-[19px] break-words text-ink-2">
                  {fact}
                </p>
              ))}
            </li>
          ))}
        </ul>
      )}
    </Block>
  );
}

function Source({ label, text }: { label: string; text: string }) {
  return (
    <pre
      role="region"
      aria-label={label}
      tabIndex={0}
      className="mt-1 max-h-96 overflow-auto border border-rule bg-leaf px-3 py-2 font-mono text-note leading-[17px]"
    >
      {text}
    </pre>
  );
}
