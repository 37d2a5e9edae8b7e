/** The interface document as one HTML page in one language, for screen and paper. */
import { findText, type LocalizedText } from "../address-space/qualified-name";
import { html, makePage, type Html } from "./html";
import type { InterfaceDocument, InterfaceMember, InterfaceMeaning, InterfaceOwner } from "./interface-document";
import { getInterfaceWords, type InterfaceWords } from "./interface-words";
import { makeReadingExamples } from "./reading-examples";

export type InterfaceHead = {
  readonly modelName: string;
  readonly version: string;
  readonly publicationDate: string;
  readonly revision: number;
};

type Writer = { readonly words: InterfaceWords; readonly say: (texts: readonly LocalizedText[]) => string };

export function writeInterfaceHtml(document: InterfaceDocument, head: InterfaceHead, language: string): string {
  const words = getInterfaceWords(language);
  const writer: Writer = { words, say: (texts) => findText(texts, language) ?? "" };
  const title = `${words.title}: ${head.modelName} ${head.version}`;
  const body = html`<header>
      <h1>${title}</h1>
      <dl>
        <dt>${words.namespace}</dt>
        <dd class="mono">${document.namespaceUri}</dd>
        <dt>${words.version}</dt>
        <dd class="mono">${head.version}</dd>
        <dt>${words.published}</dt>
        <dd class="mono">${head.publicationDate}</dd>
        <dt>${words.revision}</dt>
        <dd class="mono">${head.revision}</dd>
      </dl>
    </header>
    <nav aria-label="${words.contents}">
      <h2>${words.contents}</h2>
      <ul class="toc">
        ${document.owners.map((owner) => html`<li><a href="#${toAnchor(owner)}">${owner.name}</a></li>`)}
      </ul>
    </nav>
    ${document.owners.map((owner) => writeOwner(writer, owner))} ${writeEnumerations(writer, document)}
    ${writeExamples(writer, document)}`;
  return makePage(language, title, body);
}

function toAnchor({ nodeId }: InterfaceOwner): string {
  return `n-${nodeId.replace(/[^A-Za-z0-9]+/g, "-")}`;
}

function writeOwner(writer: Writer, owner: InterfaceOwner): Html {
  const { words, say } = writer;
  const about = say(owner.description);
  const values = owner.members.filter((m) => m.nodeClass !== "Method");
  const methods = owner.members.filter((m) => m.nodeClass === "Method");
  return html`<section>
    <h2 id="${toAnchor(owner)}"><span class="${owner.kind}">${owner.name}</span></h2>
    <p class="dim">
      ${owner.kind === "type" ? words.type : words.machine}${owner.basedOn && html`, ${owner.kind === "type" ? words.basedOn : words.isOfType} <span class="type">${owner.basedOn}</span>`}
      · <code>${owner.nodeId}</code>
    </p>
    ${about !== "" && html`<p>${about}</p>`} ${values.length > 0 && writeMembers(writer, values)}
    ${methods.length > 0 && writeMethods(writer, methods)}
    ${
      owner.events.length > 0 &&
      html`<h3>${words.events}</h3>
        <p class="type">${owner.events.join(", ")}</p>`
    }
  </section>`;
}

function writeMembers(writer: Writer, members: readonly InterfaceMember[]): Html {
  const { words } = writer;
  const heads = [words.member, words.nodeId, words.dataType, words.unit, words.range, words.access, words.meaning];
  return html`<table>
    <thead>
      <tr>
        ${heads.map((head) => html`<th scope="col">${head}</th>`)}
      </tr>
    </thead>
    <tbody>
      ${members.map(
        (member) =>
          html`<tr>
            <th scope="row" style="color:#191c1e;border-bottom:1px solid #dcdad4">
              ${member.path}${member.isOptional && html` <span class="dim">(${words.optional})</span>`}
            </th>
            <td class="mono">${member.nodeId}</td>
            <td>${member.dataType ?? html`<span class="type">${member.typeDefinition}</span>`}</td>
            <td>${member.unit}</td>
            <td class="mono">${member.range}</td>
            <td>${formatAccess(words, member)}</td>
            <td>${writeMeaning(writer, member)}</td>
          </tr>`,
      )}
    </tbody>
  </table>`;
}

function formatAccess(words: InterfaceWords, { access }: InterfaceMember): string {
  if (access === null) return "";
  return { none: words.noAccess, read: words.read, write: words.write, "read-write": words.readWrite }[access];
}

function writeMeaning({ say }: Writer, member: InterfaceMember): Html {
  const description = say(member.description);
  const meanings = member.meanings.map(({ value, name, texts }) => `${value} ${say(texts) || name}`).join(", ");
  return html`${description}${description !== "" && meanings !== "" && html`<br />`}${meanings}`;
}

function writeMethods(writer: Writer, methods: readonly InterfaceMember[]): Html {
  const { words, say } = writer;
  const list = (args: InterfaceMember["input"]): string =>
    args
      .map(
        ({ name, dataType, description }) =>
          `${name}: ${dataType}${say(description) === "" ? "" : ` (${say(description)})`}`,
      )
      .join(", ") || words.none;
  return html`<h3>${words.methods}</h3>
    <table>
      <thead>
        <tr>
          ${[words.name, words.nodeId, words.input, words.output, words.meaning].map((head) => html`<th scope="col">${head}</th>`)}
        </tr>
      </thead>
      <tbody>
        ${methods.map(
          (method) =>
            html`<tr>
              <td>${method.path}${method.isOptional && html` <span class="dim">(${words.optional})</span>`}</td>
              <td class="mono">${method.nodeId}</td>
              <td>${list(method.input)}</td>
              <td>${list(method.output)}</td>
              <td>${say(method.description)}</td>
            </tr>`,
        )}
      </tbody>
    </table>`;
}

function writeEnumerations(writer: Writer, { enumerations }: InterfaceDocument): Html | false {
  const { words, say } = writer;
  if (enumerations.length === 0) return false;
  return html`<section>
    <h2>${words.enumerations}</h2>
    ${enumerations.map(
      (enumeration) =>
        html`<h3 class="type">${enumeration.name}</h3>
          <p class="dim"><code>${enumeration.nodeId}</code> ${say(enumeration.description)}</p>
          <table>
            <thead>
              <tr>
                ${[words.value, words.name, words.meaning].map((head) => html`<th scope="col">${head}</th>`)}
              </tr>
            </thead>
            <tbody>
              ${enumeration.meanings.map((meaning) => writeMeaningRow(writer, meaning))}
            </tbody>
          </table>`,
    )}
  </section>`;
}

function writeMeaningRow({ say }: Writer, { value, name, texts, description }: InterfaceMeaning): Html {
  return html`<tr>
    <td class="mono">${value}</td>
    <td>${say(texts) || name}</td>
    <td>${say(description)}</td>
  </tr>`;
}

function writeExamples({ words }: Writer, document: InterfaceDocument): Html | false {
  const examples = makeReadingExamples(document);
  if (examples.length === 0) return false;
  return html`<section>
    <h2>${words.reading}</h2>
    <p>${words.readingAbout}</p>
    ${examples.map(
      ({ language, code }) =>
        html`<h3>${language}</h3>
          <pre><code>${code}</code></pre>`,
    )}
  </section>`;
}
