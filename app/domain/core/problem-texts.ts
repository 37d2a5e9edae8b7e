/**
 * The one table of problem texts. A code is permanent; a text may be bettered. `{name}` is replaced by `data.name`.
 * Each area keeps its texts beside its code in `<area>/problem-texts.ts` and is joined here, so that one table answers.
 */
import type { Problem } from "./result";
import { addressSpaceProblemTexts } from "../address-space/problem-texts";
import { checksProblemTexts } from "../checks/problem-texts";
import { compareProblemTexts } from "../compare/problem-texts";
import { deliverProblemTexts } from "../deliver/problem-texts";
import { editingProblemTexts } from "../editing/problem-texts";
import { ioddProblemTexts } from "../iodd/problem-texts";
import { mappingProblemTexts } from "../mapping/problem-texts";
import { sourceProblemTexts } from "../mapping/source-problem-texts";
import { releaseProblemTexts } from "../release/problem-texts";
import { testServerProblemTexts } from "../simulation/problem-texts";
import { requestProblemTexts } from "./request-problem-texts";
import { nodesetProblemTexts } from "../nodeset/problem-texts";

const texts: Readonly<Record<string, string>> = {
  "limit.file-size": "The file has {size} bytes; the limit is {limit} bytes (50 MB).",
  ...addressSpaceProblemTexts,
  ...checksProblemTexts,
  ...compareProblemTexts,
  ...nodesetProblemTexts,
  ...deliverProblemTexts,
  ...editingProblemTexts,
  ...ioddProblemTexts,
  ...mappingProblemTexts,
  ...sourceProblemTexts,
  ...releaseProblemTexts,
  ...requestProblemTexts,
  ...testServerProblemTexts,
};

/** The sentence for a problem, for people. An unknown code answers with the code itself, so that nothing is hidden. */
export function formatProblem(problem: Problem): string {
  const text = texts[problem.code] ?? problem.code;
  return text.replace(/\{(\w+)\}/g, (whole, name: string) => {
    const value = problem.data?.[name];
    return value === undefined ? whole : String(value);
  });
}

/** All codes that have a text, for the test that every code used in the code base has one. */
export function listProblemCodes(): string[] {
  return Object.keys(texts);
}
