/** Characters of names and references (XML 1.0, fifth edition, §2.2, §2.3, §4.1, §4.6). */

const NAME_START = 1;
const NAME_ONLY = 2;

/** For ASCII: may start a name, may stand in a name, or neither. */
const ASCII = new Uint8Array(128);
for (const character of "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz_:")
  ASCII[character.charCodeAt(0)] = NAME_START;
for (const character of "0123456789-.") ASCII[character.charCodeAt(0)] = NAME_ONLY;

const WIDE_START =
  /^[\u{C0}-\u{D6}\u{D8}-\u{F6}\u{F8}-\u{2FF}\u{370}-\u{37D}\u{37F}-\u{1FFF}\u{200C}-\u{200D}\u{2070}-\u{218F}\u{2C00}-\u{2FEF}\u{3001}-\u{D7FF}\u{F900}-\u{FDCF}\u{FDF0}-\u{FFFD}\u{10000}-\u{EFFFF}]$/u;

/** The offset behind the name that starts at `from`; `from` itself when there is none. */
export function findNameEnd(text: string, from: number): number {
  let at = from;
  for (;;) {
    const code = text.charCodeAt(at);
    if (code < 128) {
      const kind = ASCII[code];
      if (kind === NAME_START || (kind === NAME_ONLY && at > from)) at++;
      else return at;
    } else {
      const length = wideNameLength(text, at, at === from);
      if (length === 0) return at;
      at += length;
    }
  }
}

/** UTF-16 units of the name character beyond ASCII at `at`; 0 when it is none or the text ends. */
function wideNameLength(text: string, at: number, isFirst: boolean): number {
  const point = text.codePointAt(at);
  if (point === undefined) return 0;
  const character = String.fromCodePoint(point);
  return WIDE_START.test(character) || (!isFirst && isWideInName(point)) ? character.length : 0;
}

/** What may stand in a name but not start it: the middle dot, combining marks, ties. */
function isWideInName(point: number): boolean {
  return point === 0xb7 || (point >= 0x300 && point <= 0x36f) || point === 0x203f || point === 0x2040;
}

/** The character of a reference without `&` and `;`; undefined when it is none of the predefined ones and no number. */
export function findReferenced(reference: string): string | undefined {
  switch (reference) {
    case "amp":
      return "&";
    case "lt":
      return "<";
    case "gt":
      return ">";
    case "quot":
      return '"';
    case "apos":
      return "'";
    default:
      return toCharacter(reference);
  }
}

function toCharacter(reference: string): string | undefined {
  const match = /^#(?:([0-9]{1,7})|x([0-9a-fA-F]{1,6}))$/.exec(reference);
  if (!match) return undefined;
  const code = match[1] === undefined ? Number.parseInt(match[2] ?? "", 16) : Number(match[1]);
  return isCharacter(code) ? String.fromCodePoint(code) : undefined;
}

function isCharacter(code: number): boolean {
  if (code < 0x20) return code === 9 || code === 10 || code === 13;
  return code <= 0xd7ff || (code >= 0xe000 && code <= 0xfffd) || (code >= 0x10000 && code <= 0x10ffff);
}
