import { useEffect, useRef } from "react";
import { applyTheme, monaco, THEME } from "./load-monaco.client";

type Props = { before: string; after: string; label: string };

/** Two NodeSet2 texts beside each other with their differences. */
export default function XmlDiff({ before, after, label }: Props) {
  const host = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (!host.current) return;
    applyTheme();
    const [original, modified] = [before, after].map((text) => monaco.editor.createModel(text, "xml"));
    const editor = monaco.editor.createDiffEditor(host.current, {
      theme: THEME,
      readOnly: true,
      originalEditable: false,
      automaticLayout: true,
      fontFamily: "JetBrains Mono Variable, monospace",
      fontSize: 12,
      minimap: { enabled: false },
      hideUnchangedRegions: { enabled: true },
      renderSideBySide: true,
      ariaLabel: label,
    });
    if (original && modified) editor.setModel({ original, modified });
    const watcher = new MutationObserver(applyTheme);
    watcher.observe(document.documentElement, { attributes: true, attributeFilter: ["data-theme"] });
    return () => {
      watcher.disconnect();
      editor.dispose();
      original?.dispose();
      modified?.dispose();
    };
  }, [before, after, label]);
  return <div ref={host} className="min-h-0 flex-1" />;
}
