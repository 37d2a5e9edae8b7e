import { Search } from "lucide-react";
import { useMemo, useState } from "react";
import { Link } from "react-router";
import { findingWords, FindingShape } from "~/components/notation/finding-badge";
import { Button } from "~/components/ui/button";
import { Empty } from "~/components/ui/empty";
import { Input } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Page } from "~/components/ui/page";
import { Segments, ToggleSegments } from "~/components/ui/segments";
import { Table, TableScroll, Td, Th, Tr } from "~/components/ui/table";
import type { ListedRule } from "~/domain/checks/rule-list";
import type { Severity } from "~/domain/core/result";

type Kind = "all" | "mend" | "out";

const kinds: Record<Kind, string> = { all: "All", mend: "Mendable", out: "Not run" };
const severities: readonly Severity[] = ["error", "warning", "hint"];

/** The catalogue: what the checker knows of the standard, and what it leaves out and why. */
export function RulesView({ rules }: { rules: readonly ListedRule[] }) {
  const [kind, setKind] = useState<Kind>("all");
  const [shown, setShown] = useState<ReadonlySet<Severity>>(new Set(severities));
  const [text, setText] = useState("");
  const found = useMemo(
    () => rules.filter((r) => isOfKind(r, kind) && shown.has(r.severity) && matches(r, text)),
    [rules, kind, shown, text],
  );
  const running = rules.filter((r) => r.implemented).length;
  const toggle = (severity: Severity) => {
    const next = new Set(shown);
    if (!next.delete(severity)) next.add(severity);
    setShown(next);
  };
  const showAll = () => {
    setText("");
    setKind("all");
    setShown(new Set(severities));
  };
  return (
    <Page title="Rules" about={`${running} rules check each model; open one for its meaning and examples.`}>
      <div className="mb-3 flex flex-wrap items-center gap-3">
        <label className="relative w-72">
          <span className="sr-only">Search the rules</span>
          <Icon of={Search} className="pointer-events-none absolute inset-y-0 left-2 my-auto text-ink-3" />
          <Input
            type="search"
            value={text}
            onChange={(event) => setText(event.currentTarget.value)}
            placeholder="Number, words, clause"
            className="pl-7"
          />
        </label>
        <Segments
          label="Rules shown"
          value={kind}
          onChange={setKind}
          options={(Object.keys(kinds) as Kind[]).map((value) => ({
            value,
            label: (
              <>
                {kinds[value]} <span className="font-mono">{rules.filter((r) => isOfKind(r, value)).length}</span>
              </>
            ),
          }))}
        />
        <ToggleSegments
          label="Severities shown"
          values={shown}
          onToggle={toggle}
          options={severities.map((severity) => {
            const words = findingWords(severity, rules.filter((r) => r.severity === severity).length);
            return {
              value: severity,
              name: words,
              label: (
                <>
                  <FindingShape severity={severity} /> {words}
                </>
              ),
            };
          })}
        />
      </div>
      {found.length === 0 ? (
        <Empty title="Nothing matches" action={<Button onClick={showAll}>Show all {rules.length}</Button>} />
      ) : (
        <TableScroll label="Rules">
          <Table caption="Rules of the checker" className="min-w-200">
            <thead>
              <tr>
                <Th>Rule</Th>
                <Th>Title</Th>
                <Th>Severity</Th>
                <Th>Clause</Th>
                <Th>Mend</Th>
              </tr>
            </thead>
            <tbody>
              {found.map((rule) => (
                <RuleRow key={rule.id} rule={rule} />
              ))}
            </tbody>
          </Table>
        </TableScroll>
      )}
    </Page>
  );
}

function RuleRow({ rule }: { rule: ListedRule }) {
  return (
    <Tr>
      <Td mono>
        <Link to={`/rules/${rule.id}`} className="border-b border-rule hover:border-copper hover:text-copper">
          {rule.id}
        </Link>
      </Td>
      <Td className={rule.implemented ? "font-semibold" : "text-ink-2"}>
        {rule.title}
        {rule.reason ? <span className="block pb-1 font-normal text-ink-3">Not run: {rule.reason}</span> : null}
      </Td>
      <Td>
        <span className="flex items-center gap-1.5">
          <FindingShape severity={rule.severity} /> {rule.severity}
        </span>
      </Td>
      <Td className="text-ink-2">{rule.clause}</Td>
      <Td className="whitespace-nowrap text-ink-2">
        {rule.hasFix ? "by the rule" : rule.implemented ? "by hand" : "–"}
      </Td>
    </Tr>
  );
}

function isOfKind(rule: ListedRule, kind: Kind): boolean {
  return kind === "all" || (kind === "mend" ? rule.hasFix : !rule.implemented);
}

function matches({ id, title, clause }: ListedRule, text: string): boolean {
  const words = text.trim().toLowerCase().split(/\s+/);
  const all = `${id} ${title} ${clause}`.toLowerCase();
  return words.every((word) => all.includes(word));
}
