/** Limits of a read, the same in browser, API and command line. Each is named in the text of its problem. */

export type ReadLimits = {
  /** Size of the file, in bytes of the file or UTF-16 units of its text, whichever is asked. */
  readonly maxBytes: number;
  /** Depth of elements; the root has depth 1. */
  readonly maxDepth: number;
  /** Attributes of one element, declarations of namespaces among them. */
  readonly maxAttributes: number;
  readonly maxNodes: number;
  /** Time for one file; the domain has no clock, so whoever calls passes `shouldStop` made of this. */
  readonly maxSeconds: number;
  /** Problems that are listed; a last one says how many more there were. */
  readonly maxProblems: number;
};

export const READ_LIMITS: ReadLimits = {
  maxBytes: 50_000_000,
  maxDepth: 200,
  maxAttributes: 256,
  maxNodes: 500_000,
  maxSeconds: 20,
  maxProblems: 1_000,
};
