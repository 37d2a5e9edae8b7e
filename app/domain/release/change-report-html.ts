/** The changes between two states as a page to print: for those who decide and for those who are told. */
import type { Change, ChangeRating, Comparison } from "../compare/change";
import type { AffectedReader } from "../compare/find-affected";
import { html, makePage, type Html } from "./html";

export type ReportHead = {
  readonly modelName: string;
  readonly namespaceUri: string;
  /** What stands for the two states: `1.2.0`, `revision 27`, `working state`. */
  readonly before: string;
  readonly after: string;
  readonly proposedVersion: string | undefined;
};

export type ReportedChange = Change & { readonly readers: readonly AffectedReader[] };

const RATINGS: readonly (readonly [ChangeRating, string])[] = [
  ["breaking", "a reader written for the earlier state stops working"],
  ["additive", "old readers see nothing new"],
  ["neutral", "same nodes, same types"],
];

const EFFECTS = { stops: "stops working", look: "must look", "may-use": "may use it" } as const;

export function writeChangeReport(
  comparison: Omit<Comparison, "changes"> & { readonly changes: readonly ReportedChange[] },
  head: ReportHead,
): string {
  const title = `Changes of ${head.modelName}: ${head.before} to ${head.after}`;
  const { changes } = comparison;
  const body = html`<header>
      <h1>${title}</h1>
      <dl>
        <dt>Namespace</dt>
        <dd class="mono">${head.namespaceUri}</dd>
        <dt>Changes</dt>
        <dd>
          ${changes.length === 0 ? "none" : RATINGS.map(([rating]) => `${changes.filter((c) => c.rating === rating).length} ${rating}`).join(", ")}
        </dd>
        ${
          head.proposedVersion !== undefined &&
          html`<dt>Proposed version</dt>
            <dd class="mono">${head.proposedVersion}</dd>`
        }
      </dl>
    </header>
    ${RATINGS.map(([rating, about]) =>
      writeGroup(
        rating,
        about,
        changes.filter((c) => c.rating === rating),
      ),
    )}`;
  return makePage("en", title, body);
}

function writeGroup(rating: ChangeRating, about: string, changes: readonly ReportedChange[]): Html | false {
  if (changes.length === 0) return false;
  return html`<section>
    <h2><span class="${rating}">${rating}</span> <span class="dim">${changes.length} · ${about}</span></h2>
    <table>
      <thead>
        <tr>
          <th scope="col">Where</th>
          <th scope="col">Change</th>
          <th scope="col">Before</th>
          <th scope="col">After</th>
          <th scope="col">Why</th>
          <th scope="col">Readers</th>
        </tr>
      </thead>
      <tbody>
        ${changes.map(writeChange)}
      </tbody>
    </table>
  </section>`;
}

function writeChange(change: ReportedChange): Html {
  const readers = change.readers.map(({ name, effect }) => `${name}: ${EFFECTS[effect]}`).join("; ");
  return html`<tr>
    <th scope="row" style="color:#191c1e;border-bottom:1px solid #dcdad4">${change.path || "the model"}</th>
    <td>${change.kind.replaceAll("-", " ")}${change.detail !== undefined && ` (${change.detail})`}</td>
    <td class="mono">${change.before}</td>
    <td class="mono">${change.after}</td>
    <td>${change.reason}${change.clause !== "" && html` <span class="dim">${change.clause}</span>`}</td>
    <td>${readers}</td>
  </tr>`;
}
