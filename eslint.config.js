import js from "@eslint/js";
import tseslint from "typescript-eslint";

/** Globals of plain JavaScript run by Node.js; TypeScript files are checked by the compiler. */
const nodeGlobals = Object.fromEntries(
  [
    "process",
    "console",
    "Buffer",
    "URL",
    "AbortSignal",
    "AbortController",
    "fetch",
    "setTimeout",
    "clearTimeout",
    "setInterval",
    "clearInterval",
  ].map((name) => [name, "readonly"]),
);

export default tseslint.config(
  { ignores: ["build/", "node_modules/", ".react-router/", "data/", "data-demo/", "drizzle/"] },
  { linterOptions: { reportUnusedDisableDirectives: "error" } },
  js.configs.recommended,
  ...tseslint.configs.strict,
  {
    languageOptions: { globals: nodeGlobals },
    rules: {
      "@typescript-eslint/no-explicit-any": "error",
      "@typescript-eslint/no-non-null-assertion": "error",
      "@typescript-eslint/consistent-type-imports": "error",
      "@typescript-eslint/no-unused-vars": ["error", { argsIgnorePattern: "^_", ignoreRestSiblings: true }],
      "@typescript-eslint/no-extraneous-class": "off",
      "@typescript-eslint/unified-signatures": "off",
      "no-irregular-whitespace": ["error", { skipStrings: true, skipTemplates: true }],
      eqeqeq: "error",
      "no-console": ["error", { allow: ["warn", "error"] }],
    },
  },
  { files: ["app/cli/**", "tests/**", "app/server.ts"], rules: { "no-console": "off" } },
);
