/** The layers of the house and the habits that a machine can check. Each failure says what to do instead. */
import { readdirSync, readFileSync } from "node:fs";
import { isBuiltin } from "node:module";
import { join } from "node:path";
import ts from "typescript";
import { describe, expect, it } from "vitest";
import { formatProblem, listProblemCodes } from "~/domain/core/problem-texts";
import { domainAreas, findLayer, packageHomes, topLevelEntries, type LayerRule } from "../support/import-rules";
import {
  lineOf,
  listFiles,
  packageOf,
  projectRoot,
  readSourceFiles,
  resolveImport,
  walk,
  type Import,
  type SourceFile,
} from "../support/source-files";

const appFiles = readSourceFiles("app");
const testFiles = readSourceFiles("tests");
const allFiles = [...appFiles, ...testFiles];

/** Every place where `check` answers a message, as `path:line message`. */
function collect(
  files: readonly SourceFile[],
  check: (file: SourceFile, node: ts.Node) => string | undefined,
): string[] {
  const found: string[] = [];
  for (const file of files) {
    walk(file.ast, (node) => {
      const message = check(file, node);
      if (message) found.push(`${file.path}:${lineOf(file, node)} ${message}`);
    });
  }
  return found;
}

function matchLines(files: readonly { path: string; text: string }[], pattern: RegExp, message: string): string[] {
  return files.flatMap((file) =>
    file.text
      .split("\n")
      .flatMap((line, index) =>
        pattern.test(line) ? [`${file.path}:${index + 1} ${message}: ${line.trim().slice(0, 100)}`] : [],
      ),
  );
}

describe("imports", () => {
  it("stay within what the layer may import", () => {
    const wrong = appFiles.flatMap((file) => {
      const rule = findLayer(file.path);
      if (!rule)
        return [`${file.path} belongs to no layer. The folders below app/ are those of DEVELOPERS.md, "Layers".`];
      return file.imports.flatMap((found) => findWrongImport(file, rule, found) ?? []);
    });
    expect(wrong).toEqual([]);
  });

  it("never go from one route module to another", () => {
    const wrong = appFiles
      .filter((file) => /^app\/(routes\/|root\.tsx$)/.test(file.path))
      .flatMap((file) =>
        file.imports
          .filter((found) => resolveImport(file.path, found.specifier)?.startsWith("app/routes/"))
          .map(
            (found) =>
              `${file.path}:${found.line} imports the route ${found.specifier}. Move what both need into a component, presenter or service.`,
          ),
      );
    expect(wrong).toEqual([]);
  });

  it("form no cycle", () => {
    expect(findCycles(appFiles)).toEqual([]);
  });

  it("pass through no index file that only re-exports", () => {
    const message = "re-exports. Import from the file that defines the name, so that a search for it ends there.";
    const wrong = collect(appFiles, (_file, node) =>
      ts.isExportDeclaration(node) && node.moduleSpecifier && !node.exportClause ? message : undefined,
    );
    const indexes = appFiles
      .filter((file) => /\/index\.tsx?$/.test(file.path))
      .map((file) => `${file.path} is an index file. Name it after its main export.`);
    expect([...wrong, ...indexes]).toEqual([]);
  });

  it("find their file", () => {
    const wrong = allFiles.flatMap((file) =>
      file.imports
        .filter(
          (found) =>
            /^(\.|~\/)/.test(found.specifier) && !/\.(css|json|svg|png|wasm)$|\/\+types\/|\?/.test(found.specifier),
        )
        .filter((found) => !resolveImport(file.path, found.specifier))
        .map((found) => `${file.path}:${found.line} ${found.specifier}`),
    );
    expect(wrong).toEqual([]);
  });
});

function findWrongImport(file: SourceFile, rule: LayerRule, found: Import): string | undefined {
  const at = `${file.path}:${found.line}`;
  const pack = packageOf(found.specifier);
  if (pack !== undefined) return findWrongPackage(file.path, at, rule, pack);
  const target = resolveImport(file.path, found.specifier);
  const layer = target && findLayer(target);
  if (!target || !layer) return undefined;
  if (isServerOnly(target) && !rule.node && !["root", "routes"].includes(rule.name) && !found.isTypeOnly) {
    return `${at} brings the server's ${target} into the browser. ${rule.advice}`;
  }
  if (rule.mayImport.includes(layer.name)) return undefined;
  if (found.isTypeOnly && rule.mayImportTypesOf?.includes(layer.name)) return undefined;
  return `${at} ${rule.name} may not import ${layer.name} (${target}). ${rule.advice}`;
}

function isServerOnly(path: string): boolean {
  return /\.server\.tsx?$/.test(path);
}

function findWrongPackage(path: string, at: string, rule: LayerRule, pack: string): string | undefined {
  const home = packageHomes[pack];
  if (home) return home.test(path) ? undefined : `${at} only ${home.source} may know ${pack}. ${rule.advice}`;
  if (isBuiltin(pack))
    return rule.node ? undefined : `${at} ${rule.name} may not use Node.js (${pack}). ${rule.advice}`;
  if (rule.packages && !rule.packages.includes(pack))
    return `${at} ${rule.name} may not use the package ${pack}. ${rule.advice}`;
  return undefined;
}

/** Groups of files that import each other, types included: a type that two files share belongs into a third. */
function findCycles(files: readonly SourceFile[]): string[] {
  const targets = new Map(
    files.map((file) => [file.path, file.imports.flatMap((i) => resolveImport(file.path, i.specifier) ?? [])]),
  );
  const state = new Map<string, "open" | "done">();
  const cycles: string[] = [];
  const visit = (path: string, trail: readonly string[]): void => {
    if (state.get(path) === "done") return;
    if (state.get(path) === "open") {
      cycles.push(`${[...trail.slice(trail.indexOf(path)), path].join(" → ")}. Move what both need into a third file.`);
      return;
    }
    state.set(path, "open");
    for (const target of targets.get(path) ?? []) visit(target, [...trail, path]);
    state.set(path, "done");
  };
  for (const path of targets.keys()) visit(path, []);
  return cycles;
}

describe("the tree", () => {
  it("has no other entries at its top than the listed ones", () => {
    const ignored = readFileSync(join(projectRoot, ".gitignore"), "utf8")
      .split("\n")
      .map((line) => line.replace(/^\/|\/$/g, ""));
    const extra = readdirSync(projectRoot).filter(
      (name) => name !== ".git" && !ignored.includes(name) && !name.endsWith(".log") && !topLevelEntries.includes(name),
    );
    expect(extra, "Put the file below app/, tests/, nodesets/ or public/").toEqual([]);
  });

  it("has no other areas in the domain than the listed ones", () => {
    const areas = readdirSync(join(projectRoot, "app/domain"), { withFileTypes: true })
      .filter((e) => e.isDirectory())
      .map((e) => e.name);
    expect(areas.filter((area) => !domainAreas.includes(area))).toEqual([]);
  });

  it("names its files in kebab-case", () => {
    const plain = /^[a-z0-9]+(-[a-z0-9]+)*(\.(server|client|test|config|d))*\.(ts|tsx|mjs)$/;
    // A segment that is a parameter has the parameter's name: models.$modelId.sheet.tsx.
    const route = /^[a-z0-9]+(-[a-z0-9]+)*(\.(\$[a-z][A-Za-z]*|[a-z0-9]+(-[a-z0-9]+)*))*\.tsx?$/;
    const wrong = allFiles.filter(({ path }) => {
      const name = path.slice(path.lastIndexOf("/") + 1);
      return !(path.startsWith("app/routes/") ? route : plain).test(name);
    });
    expect(wrong.map((file) => file.path)).toEqual([]);
  });

  it("keeps files readable", () => {
    const rows = [...groupByLayer(appFiles)].map(([layer, files]) => ({ layer, ...describeSizes(files) }));
    console.table(rows);
    const long = appFiles
      .map((file) => ({ path: file.path, lines: countLines(file) }))
      .filter((file) => file.lines > 300);
    console.log(long.map((file) => `${file.lines} ${file.path}`).join("\n"));
    expect(rows.length).toBeGreaterThan(0);
  });
});

function groupByLayer(files: readonly SourceFile[]): Map<string, SourceFile[]> {
  const groups = new Map<string, SourceFile[]>();
  for (const file of files) {
    const name = findLayer(file.path)?.name ?? "none";
    groups.set(name, [...(groups.get(name) ?? []), file]);
  }
  return groups;
}

function countLines(file: SourceFile): number {
  return file.text.split("\n").length - 1;
}

function describeSizes(files: readonly SourceFile[]): Record<string, number> {
  const sizes = files.map(countLines).sort((a, b) => a - b);
  const at = (share: number): number => sizes[Math.min(sizes.length - 1, Math.floor(sizes.length * share))] ?? 0;
  return { files: sizes.length, lines: sizes.reduce((a, b) => a + b, 0), median: at(0.5), p90: at(0.9), max: at(1) };
}

describe("habits", () => {
  it("leave out the type any", () => {
    const wrong = collect(allFiles, (_file, node) =>
      node.kind === ts.SyntaxKind.AnyKeyword ? "uses any. Name the type, or take unknown and check it." : undefined,
    );
    expect(wrong).toEqual([]);
  });

  it("print nothing from code that also runs in the browser", () => {
    const shared = appFiles.filter((file) =>
      ["domain", "editor", "ui", "components"].includes(findLayer(file.path)?.name ?? ""),
    );
    const wrong = collect(shared, (_file, node) =>
      ts.isPropertyAccessExpression(node) && ts.isIdentifier(node.expression) && node.expression.text === "console"
        ? "prints to the console. Answer a problem instead."
        : undefined,
    );
    expect(wrong).toEqual([]);
  });

  it("silence no checker and leave no note to do later", () => {
    const marks = [
      "eslint" + "-disable",
      "@ts-" + "ignore",
      "@ts-" + "expect-error",
      "@ts-" + "nocheck",
      "TO" + "DO",
      "FIX" + "ME",
    ];
    expect(matchLines(allFiles, new RegExp(marks.map((mark) => `${mark}\\b`).join("|")), "holds a mark")).toEqual([]);
  });

  it("skip no test and run none alone", () => {
    const wrong = collect(testFiles, (_file, node) =>
      ts.isPropertyAccessExpression(node) &&
      /^(skip|only|todo|skipIf|runIf|fails)$/.test(node.name.text) &&
      /^(it|test|describe)\b/.test(node.expression.getText())
        ? "Let every test run, or delete it."
        : undefined,
    );
    expect(wrong).toEqual([]);
  });

  it("name no path of one machine", () => {
    const documents = [
      "README.md",
      "DEVELOPERS.md",
      "package.json",
      ...listFiles(".ci"),
      ...listFiles("nodesets").filter((path) => /\.(json|xml)$/.test(path)),
    ].map((path) => ({ path, text: readFileSync(join(projectRoot, path), "utf8") }));
    const folders = new RegExp(
      `(^|[\\s"'\`(=])/(${["work", "tmp", "root", "home", "Users"].join("|")})/|\\.\\./${"shared"}`,
    );
    expect(matchLines([...allFiles, ...documents], folders, "names a path of one machine")).toEqual([]);
  });

  it("read the environment where the process starts and in one place besides", () => {
    const inside = appFiles.filter(
      (file) => file.path !== "app/utils/env.server.ts" && !["cli", "entry"].includes(findLayer(file.path)?.name ?? ""),
    );
    const wrong = collect(inside, (_file, node) =>
      ts.isPropertyAccessExpression(node) && node.getText() === "process.env"
        ? "reads the environment. Take the value from utils/env.server.ts."
        : undefined,
    );
    expect(wrong).toEqual([]);
  });

  it("take no NodeId apart outside the code that reads them", () => {
    const outside = appFiles.filter((file) => !/^app\/domain\/(address-space|nodeset)\//.test(file.path));
    const wrong = collect(outside, (_file, node) =>
      ts.isRegularExpressionLiteral(node) && /nsu?=/.test(node.text)
        ? "matches NodeIds by a pattern. Call parseNodeId."
        : undefined,
    );
    expect(wrong).toEqual([]);
  });
});

describe("problem codes", () => {
  const used = new Map<string, string>();
  collect(appFiles, (file, node) => {
    const code = findProblemCode(node);
    if (code) used.set(code, `${file.path}:${lineOf(file, node)}`);
    return undefined;
  });

  it("each have a text", () => {
    const known = new Set(listProblemCodes());
    const missing = [...used]
      .filter(([code]) => !known.has(code))
      .map(([code, place]) => `${place} ${code}: add its text to the problem-texts.ts of the area.`);
    expect(missing).toEqual([]);
  });

  it("are each used", () => {
    const literals = new Set<string>();
    const code = appFiles.filter((file) => !file.path.endsWith("/problem-texts.ts"));
    collect(code, (_file, node) => (ts.isStringLiteralLike(node) && literals.add(node.text), undefined));
    expect(listProblemCodes().filter((known) => !literals.has(known))).toEqual([]);
  });

  it("have texts that end as sentences", () => {
    const wrong = listProblemCodes().filter((code) => !/[.!?”)}]$/.test(formatProblem({ code, severity: "error" })));
    expect(wrong).toEqual([]);
  });
});

/** The code in `problem("…")`, `problem.warning("…")`, `problem.hint("…")` and `{ code: "…", severity: … }`. */
function findProblemCode(node: ts.Node): string | undefined {
  if (ts.isCallExpression(node) && /^problem(\.warning|\.hint)?$/.test(node.expression.getText())) {
    const first = node.arguments[0];
    return first && ts.isStringLiteralLike(first) ? first.text : undefined;
  }
  if (ts.isObjectLiteralExpression(node)) {
    const values = new Map(
      node.properties.flatMap((p) =>
        ts.isPropertyAssignment(p) && ts.isIdentifier(p.name) ? [[p.name.text, p.initializer] as const] : [],
      ),
    );
    const code = values.get("code");
    if (code && values.has("severity") && ts.isStringLiteralLike(code)) return code.text;
  }
  return undefined;
}
