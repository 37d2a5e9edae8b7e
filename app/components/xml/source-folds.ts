/** Where the source text folds: one fold a node, and the elements inside of it that take several lines. Pure. */
export type Fold = { readonly start: number; readonly end: number };

const OPENING = /^( *)<((?:[\w.-]+:)?[\w.-]+)(?:\s[^<]*)?[^/<]>\s*$|^( *)<((?:[\w.-]+:)?[\w.-]+)>\s*$/;
const CLOSING = /^( *)<\/((?:[\w.-]+:)?[\w.-]+)>\s*$/;

/** Lines are 1-based; a fold hides what lies between its start and its end. Text that is not laid out line by line has none. */
export function listFolds(text: string): Fold[] {
  const folds: Fold[] = [];
  const open: { readonly tag: string; readonly indent: number; readonly line: number }[] = [];
  text.split("\n").forEach((content, index) => {
    const line = index + 1;
    const closing = CLOSING.exec(content);
    if (closing) {
      const indent = closing[1]?.length ?? 0;
      while ((open.at(-1)?.indent ?? -1) > indent) open.pop();
      const start = open.at(-1);
      if (start?.indent !== indent || start.tag !== closing[2]) return;
      open.pop();
      // The root is the text itself.
      if (indent > 0) folds.push({ start: start.line, end: line });
      return;
    }
    const opening = OPENING.exec(content);
    if (opening) open.push({ tag: opening[2] ?? opening[4] ?? "", indent: (opening[1] ?? opening[3] ?? "").length, line });
  });
  return folds.sort((a, b) => a.start - b.start);
}
