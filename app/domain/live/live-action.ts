/** Acts of Live on a server: what is asked, and what came of it. */
import type { Sample } from "./sample";

export type MethodArgument = {
  readonly name: string;
  /** Built-in type that it is encoded as; "array" for what is not typed into one field. */
  readonly builtInType: string;
  readonly description: string | null;
};

export type WriteAnswer = { readonly before: Sample; readonly after: Sample; readonly status: string; readonly isDone: boolean };

export type CallAnswer = {
  readonly status: string;
  readonly isDone: boolean;
  readonly outputs: readonly { readonly name: string; readonly text: string }[];
};
