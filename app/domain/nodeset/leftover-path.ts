/**
 * How leftovers name the element that they belong to (`Leftover.at`). Reader and writer walk the same elements in the same
 * order and make the same names.
 */

/** One step of a path: the element, what tells it from its siblings, and which of those that are called the same it is. */
export function toStep(element: string, name: string | undefined, nth: number): string {
  const step = name === undefined ? element : `${element}:${name}`;
  return nth > 1 ? `${step}#${nth}` : step;
}

export function joinPath(parent: string, step: string): string {
  return parent === "" ? step : `${parent}/${step}`;
}

/** What tells a Reference from the others of its node. */
export function nameReference(reference: {
  readonly type: string;
  readonly target: string;
  readonly isForward: boolean;
}): string {
  return `${reference.type} ${reference.isForward ? "" : "inverse "}${reference.target}`;
}

/** The path of what stands behind the root element. */
export const BEHIND_ROOT = "/";
