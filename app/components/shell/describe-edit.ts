/** The label of a transaction as people read it: `set-unit` → `set unit`. */
export function describeEdit(label: string): string {
  return label.replaceAll("-", " ");
}
