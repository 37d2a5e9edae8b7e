/** What a reading of a field source gives: a value with the time of its acquisition, or why there is none. */
import type { Problem } from "../domain/core/result";

export type Reading<T> =
  | { readonly ok: true; readonly value: T; readonly time: number }
  /** `status` is the OPC UA status code that the fed Variables take meanwhile. */
  | { readonly ok: false; readonly status: number; readonly problem: Problem; readonly time: number };
