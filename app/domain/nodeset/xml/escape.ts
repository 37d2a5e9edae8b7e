/** Escaping after XML 1.0 §2.2, §2.4 and §3.3.3. */

// What must not stand as it is: markup, what a parser would normalise, and what no XML document may hold.
const IN_TEXT = /[&<>]|[^\t\n\u{20}-\u{D7FF}\u{E000}-\u{FFFD}\u{10000}-\u{10FFFF}]/u;
const IN_ATTRIBUTE = /[&<>"]|[^\u{20}-\u{D7FF}\u{E000}-\u{FFFD}\u{10000}-\u{10FFFF}]/u;
const ALL_IN_TEXT = new RegExp(IN_TEXT.source, "gu");
const ALL_IN_ATTRIBUTE = new RegExp(IN_ATTRIBUTE.source, "gu");

/** Character data. A character that XML cannot hold becomes U+FFFD. */
export function escapeText(text: string): string {
  return IN_TEXT.test(text) ? text.replace(ALL_IN_TEXT, toReference) : text;
}

/** The value of an attribute in double quotes; line breaks and tabs survive as references. */
export function escapeAttribute(value: string): string {
  return IN_ATTRIBUTE.test(value) ? value.replace(ALL_IN_ATTRIBUTE, toReference) : value;
}

/** Undoes the five predefined entities and character references; other text stays. */
export function unescapeXml(text: string): string {
  if (!text.includes("&")) return text;
  return text.replace(/&(?:#(\d{1,7})|#x([0-9a-fA-F]{1,6})|(amp|lt|gt|quot|apos));/g, (whole, decimal, hex, name) => {
    if (name !== undefined) return NAMED[name as keyof typeof NAMED];
    const code = decimal !== undefined ? Number(decimal) : Number.parseInt(String(hex), 16);
    return code <= 0x10ffff ? String.fromCodePoint(code) : whole;
  });
}

const NAMED = { amp: "&", lt: "<", gt: ">", quot: '"', apos: "'" } as const;

function toReference(character: string): string {
  switch (character) {
    case "&":
      return "&amp;";
    case "<":
      return "&lt;";
    case ">":
      return "&gt;";
    case '"':
      return "&quot;";
    case "\t":
    case "\n":
    case "\r":
      return `&#${character.charCodeAt(0)};`;
    default:
      return "\uFFFD";
  }
}
