/** The editor for source text, loaded when it is wanted the first time: it is larger than all the rest together. */
import EditorWorker from "monaco-editor/editor/editor.worker.js?worker";
import * as monaco from "monaco-editor/editor.js";
import "monaco-editor/features/bracketMatching/register.js";
import "monaco-editor/features/caretOperations/register.js";
import "monaco-editor/features/clipboard/register.js";
import "monaco-editor/features/codeEditor/register.js";
import "monaco-editor/features/codicon/register.js";
import "monaco-editor/features/comment/register.js";
import "monaco-editor/features/cursorUndo/register.js";
import "monaco-editor/features/find/register.js";
import "monaco-editor/features/folding/register.js";
import "monaco-editor/features/gotoError/register.js";
import "monaco-editor/features/hover/register.js";
import "monaco-editor/features/indentation/register.js";
import "monaco-editor/features/linesOperations/register.js";
import "monaco-editor/features/multicursor/register.js";
import "monaco-editor/features/stickyScroll/register.js";
import "monaco-editor/features/toggleTabFocusMode/register.js";
import "monaco-editor/features/wordHighlighter/register.js";
import "monaco-editor/features/wordOperations/register.js";
import "monaco-editor/languages/definitions/xml/register.js";

self.MonacoEnvironment = { getWorker: () => new EditorWorker() };

const THEME = "ferrule";

/** Colours of the page's tokens, as they are now: the editor takes no custom properties. */
export function applyTheme(): void {
  const style = getComputedStyle(document.documentElement);
  const colour = (name: string): string => style.getPropertyValue(name).trim();
  const bare = (name: string): string => colour(name).replace("#", "");
  monaco.editor.defineTheme(THEME, {
    base: style.colorScheme === "dark" ? "vs-dark" : "vs",
    inherit: true,
    rules: [
      { token: "", foreground: bare("--ink") },
      { token: "tag.xml", foreground: bare("--ink") },
      { token: "delimiter.xml", foreground: bare("--ink-3") },
      { token: "attribute.name.xml", foreground: bare("--ink-2") },
      { token: "attribute.value.xml", foreground: bare("--hint") },
      { token: "comment.xml", foreground: bare("--ink-3") },
      { token: "metatag.xml", foreground: bare("--ink-3") },
    ],
    colors: {
      "editor.background": colour("--paper"),
      "editor.foreground": colour("--ink"),
      "editorLineNumber.foreground": colour("--ink-3"),
      "editorLineNumber.activeForeground": colour("--copper"),
      "editor.selectionBackground": colour("--copper-wash"),
      "editor.lineHighlightBackground": colour("--bench"),
      "editor.lineHighlightBorder": colour("--bench"),
      "editorGutter.background": colour("--bench"),
      "editorIndentGuide.background1": colour("--hair"),
      "editorCursor.foreground": colour("--copper"),
      "editor.foldBackground": "#00000000",
      "editorHoverWidget.background": colour("--leaf"),
      "editorHoverWidget.foreground": colour("--ink"),
      "editorHoverWidget.border": colour("--ink"),
      "editorStickyScroll.background": colour("--bench"),
      "editorStickyScrollHover.background": colour("--bench-2"),
      "editorWidget.background": colour("--leaf"),
      "editorWidget.border": colour("--ink"),
    },
  });
  monaco.editor.setTheme(THEME);
}

export { monaco, THEME };
