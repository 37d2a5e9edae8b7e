/** The project's own source, read once, with what the architecture test asks of it. */
import { existsSync, readdirSync, readFileSync } from "node:fs";
import { dirname, join, posix } from "node:path";
import { fileURLToPath } from "node:url";
import ts from "typescript";

export const projectRoot = fileURLToPath(new URL("../..", import.meta.url));

export type Import = { specifier: string; line: number; isTypeOnly: boolean };

export type SourceFile = {
  /** From the project's root, with slashes. */
  path: string;
  text: string;
  ast: ts.SourceFile;
  imports: Import[];
};

const CODE = /\.(ts|tsx|mjs)$/;

export function listFiles(folder: string): string[] {
  const paths: string[] = [];
  for (const entry of readdirSync(join(projectRoot, folder), { withFileTypes: true })) {
    const path = posix.join(folder, entry.name);
    if (entry.isDirectory()) paths.push(...listFiles(path));
    else paths.push(path);
  }
  return paths.sort();
}

export function readSourceFiles(folder: string): SourceFile[] {
  return listFiles(folder)
    .filter((path) => CODE.test(path))
    .map(readSourceFile);
}

function readSourceFile(path: string): SourceFile {
  const text = readFileSync(join(projectRoot, path), "utf8");
  const ast = ts.createSourceFile(path, text, ts.ScriptTarget.Latest, true);
  return { path, text, ast, imports: listImports(ast) };
}

/** Calls `visit` for every node of the syntax tree. */
export function walk(node: ts.Node, visit: (node: ts.Node) => void): void {
  visit(node);
  ts.forEachChild(node, (child) => walk(child, visit));
}

export function lineOf(file: SourceFile, node: ts.Node): number {
  return file.ast.getLineAndCharacterOfPosition(node.getStart(file.ast)).line + 1;
}

/** Every import and re-export: statements, `import()` and `import("…")` in types. */
function listImports(ast: ts.SourceFile): Import[] {
  const imports: Import[] = [];
  const add = (node: ts.Node, specifier: ts.Node | undefined, isTypeOnly: boolean): void => {
    if (!specifier || !ts.isStringLiteralLike(specifier)) return;
    const line = ast.getLineAndCharacterOfPosition(node.getStart(ast)).line + 1;
    imports.push({ specifier: specifier.text, line, isTypeOnly });
  };
  walk(ast, (node) => {
    if (ts.isImportDeclaration(node)) add(node, node.moduleSpecifier, isTypeOnlyImport(node.importClause));
    else if (ts.isExportDeclaration(node)) add(node, node.moduleSpecifier, node.isTypeOnly);
    else if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) add(node, node.argument.literal, true);
    else if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword)
      add(node, node.arguments[0], false);
  });
  return imports;
}

function isTypeOnlyImport(clause: ts.ImportClause | undefined): boolean {
  if (!clause) return false;
  if (clause.phaseModifier === ts.SyntaxKind.TypeKeyword) return true;
  const bindings = clause.namedBindings;
  return !clause.name && !!bindings && ts.isNamedImports(bindings) && bindings.elements.every((e) => e.isTypeOnly);
}

/** The project's file that an import names; undefined for packages, assets and generated route types. */
export function resolveImport(from: string, specifier: string): string | undefined {
  const bare = specifier.replace(/\?.*$/, "");
  if (bare.includes("/+types/")) return undefined;
  let base: string;
  if (bare.startsWith("~/")) base = posix.join("app", bare.slice(2));
  else if (bare.startsWith(".")) base = posix.join(dirname(from), bare);
  else return undefined;
  return ["", ".ts", ".tsx", ".mjs"].map((end) => base + end).find((path) => CODE.test(path) && isFile(path));
}

function isFile(path: string): boolean {
  return existsSync(join(projectRoot, path));
}

/** `drizzle-orm/libsql` → `drizzle-orm`, `@xyflow/react` → itself; undefined for a file of the project. */
export function packageOf(specifier: string): string | undefined {
  if (specifier.startsWith(".") || specifier.startsWith("~/") || specifier.startsWith("virtual:")) return undefined;
  const parts = specifier.split("/");
  return specifier.startsWith("@") ? parts.slice(0, 2).join("/") : parts[0];
}
