/** Problem documents after RFC 9457 for data routes and the API; `code` and `problems` are extension members. */
import { formatProblem } from "../domain/core/problem-texts";
import { problem, type Problem } from "../domain/core/result";

const titles: Readonly<Record<number, string>> = {
  400: "The request cannot be understood",
  401: "Sign in first",
  403: "Not allowed",
  404: "Not found",
  405: "Method not allowed",
  408: "The request took too long",
  409: "In conflict with the present state",
  413: "Too large",
  415: "Wrong content type",
  422: "Cannot be processed",
  429: "Too many requests",
  500: "Something went wrong on our side",
  503: "Not available now",
};

/** A problem as clients get it: the code, the sentence, and the place where one is known. */
export type ProblemJson = {
  code: string;
  severity: Problem["severity"];
  message: string;
  line?: number;
  column?: number;
  at?: Problem["at"];
  data?: Problem["data"];
};

export function toProblemJson(found: Problem): ProblemJson {
  return {
    code: found.code,
    severity: found.severity,
    message: formatProblem(found),
    ...(found.at?.line === undefined ? {} : { line: found.at.line }),
    ...(found.at?.column === undefined ? {} : { column: found.at.column }),
    ...(found.at ? { at: found.at } : {}),
    ...(found.data ? { data: found.data } : {}),
  };
}

export function problemResponse(
  status: number,
  problems: readonly Problem[],
  extra: { members?: Readonly<Record<string, unknown>>; headers?: Readonly<Record<string, string>> } = {},
): Response {
  const first = problems[0];
  const body = {
    type: "about:blank",
    title: titles[status] ?? "Problem",
    status,
    ...(first ? { code: first.code, detail: formatProblem(first) } : {}),
    problems: problems.map(toProblemJson),
    ...extra.members,
  };
  return new Response(JSON.stringify(body), {
    status,
    headers: { "content-type": "application/problem+json", "cache-control": "no-store", ...extra.headers },
  });
}

/** The same for one problem known by its code. */
export function failWith(status: number, code: string, data?: Problem["data"], headers?: Readonly<Record<string, string>>): Response {
  return problemResponse(status, [problem(code, data)], headers ? { headers } : {});
}
