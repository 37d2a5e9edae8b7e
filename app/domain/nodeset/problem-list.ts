/** Problems of one read, in the order found, with a cap: a file can be wrong in every line. */
import { problem, type Problem } from "../core/result";

export class ProblemList {
  readonly #limit: number;
  readonly #problems: Problem[] = [];
  #more = 0;

  constructor(limit: number) {
    this.#limit = limit;
  }

  add(found: Problem): void {
    if (this.#problems.length < this.#limit) this.#problems.push(found);
    else this.#more++;
  }

  /** The problems; the last one tells how many were left out. Its severity is "error", since an error may be among them. */
  toArray(): Problem[] {
    if (this.#more === 0) return this.#problems;
    return [...this.#problems, problem("limit.problems", { count: this.#more, limit: this.#limit })];
  }
}
