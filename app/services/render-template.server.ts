/**
 * Text templates in Liquid: loops, conditions and filters over plain data. A template runs no code, reads no file and no
 * environment, and ends within limits of time and memory.
 */
import { Liquid, ParseError, RenderError, TokenizationError } from "liquidjs";
import type { TemplateData } from "../domain/deliver/template-data";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";

export const TEMPLATE_LIMITS = { characters: 200_000, renderMs: 2_000, memory: 50_000_000, output: 20_000_000 } as const;

function makeEngine(): Liquid {
  return new Liquid({
    // Partials are looked for here and nowhere else: there are none.
    templates: {},
    ownPropertyOnly: true,
    strictFilters: true,
    cache: false,
    parseLimit: TEMPLATE_LIMITS.characters,
    renderLimit: TEMPLATE_LIMITS.renderMs,
    memoryLimit: TEMPLATE_LIMITS.memory,
  });
}

/** Problems: `template.too-long`, `template.syntax` with line and column, `template.render` (limits, unknown filters). */
export async function renderTemplate(template: string, data: TemplateData): Promise<Result<string>> {
  if (template.length > TEMPLATE_LIMITS.characters) {
    return fail(problem("template.too-long", { size: template.length, limit: TEMPLATE_LIMITS.characters }));
  }
  const engine = makeEngine();
  try {
    const text: unknown = await engine.render(engine.parse(template), data as object);
    const rendered = String(text);
    return rendered.length > TEMPLATE_LIMITS.output ? fail(problem("template.too-long", { size: rendered.length, limit: TEMPLATE_LIMITS.output })) : ok(rendered);
  } catch (error) {
    return fail(describe(error));
  }
}

/** The engine throws on bad templates; here that becomes a value with its place. */
function describe(error: unknown): Problem {
  const isSyntax = error instanceof ParseError || error instanceof TokenizationError;
  const message = error instanceof Error ? (error.message.split("\n")[0] ?? "") : String(error);
  const place = /line:(\d+), col:(\d+)/.exec(message);
  const at = place ? { line: Number(place[1]), column: Number(place[2]) } : undefined;
  const text = message.replace(/, line:\d+, col:\d+.*$/, "").replace(/[.\s]+$/, "");
  return problem(isSyntax && !(error instanceof RenderError) ? "template.syntax" : "template.render", { message: text, limit: TEMPLATE_LIMITS.renderMs }, at);
}
