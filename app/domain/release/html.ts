/** Making HTML of plain values: what is not marked as HTML is text and gets escaped. */
export class Html {
  readonly markup: string;
  constructor(markup: string) {
    this.markup = markup;
  }
}

type Part = string | number | null | undefined | false | Html | readonly Part[];

/** A template whose values are escaped, lists joined, and nothing written for what is absent. */
export function html(strings: TemplateStringsArray, ...parts: readonly Part[]): Html {
  return new Html(strings.map((text, i) => text + (i < parts.length ? toMarkup(parts[i]) : "")).join(""));
}

function toMarkup(part: Part): string {
  if (part === null || part === undefined || part === false) return "";
  if (part instanceof Html) return part.markup;
  if (typeof part === "object") return part.map(toMarkup).join("");
  return String(part).replace(/[&<>"']/g, (character) => `&#${character.charCodeAt(0)};`);
}

/** A page that reads well on paper: black on white, tables that keep their heads, no script and nothing from elsewhere. */
export function makePage(language: string, title: string, body: Html): string {
  return html`<!doctype html>
    <html lang="${language}">
      <head>
        <meta charset="utf-8" />
        <meta name="viewport" content="width=device-width" />
        <title>${title}</title>
        <style>
          ${new Html(STYLE)}
        </style>
      </head>
      <body>
        ${body}
      </body>
    </html> `.markup;
}

const STYLE = `
:root{color-scheme:light}body{font:13px/1.45 Inter,system-ui,sans-serif;color:#191c1e;background:#fff;margin:24px auto;max-width:1080px;padding:0 20px}
h1{font-size:22px;margin:0 0 4px}h2{font-size:17px;margin:28px 0 6px;border-top:1.5px solid #191c1e;padding-top:8px}h3{font-size:14px;margin:18px 0 4px}
p{margin:4px 0 8px}.type{font-style:italic}.dim{color:#555b60}code,.mono{font-family:"JetBrains Mono",ui-monospace,monospace;font-size:11.5px;font-variant-ligatures:none}
table{border-collapse:collapse;width:100%;margin:6px 0 14px}th{font-size:11px;font-weight:500;color:#555b60;text-align:left;border-bottom:1px solid #191c1e;padding:3px 8px 3px 0;vertical-align:bottom}
td{border-bottom:1px solid #dcdad4;padding:3px 8px 3px 0;vertical-align:top}td.mono{word-break:break-all}thead{display:table-header-group}tr{break-inside:avoid}
dl{display:grid;grid-template-columns:170px 1fr;gap:2px 12px;margin:8px 0}dt{color:#555b60}dd{margin:0}pre{border:1px solid #dcdad4;padding:8px 10px;overflow-x:auto;white-space:pre-wrap}
ul.toc{columns:2;padding-left:18px}.breaking{font-weight:600;color:#a3122f}.additive{font-weight:600;color:#1f6b3b}.neutral{color:#555b60}a{color:inherit}
@media print{body{margin:0;max-width:none;font-size:9.5pt}h2{break-after:avoid}h3{break-after:avoid}section{break-before:auto}pre{white-space:pre-wrap}a{text-decoration:none}@page{margin:16mm 14mm}}
`;
