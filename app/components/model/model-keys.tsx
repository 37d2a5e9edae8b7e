import { useCallback, useEffect, useMemo } from "react";
import { useLocation, useNavigate, useSearchParams } from "react-router";
import type { NodeKey } from "~/domain/address-space/node-id";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import type { PaletteEntry, PaletteSource } from "../palette/palette-store";
import { usePaletteActions, usePaletteSource } from "../palette/use-palette-actions";
import { findNodes } from "./find-nodes";
import { findRangeOf, findUnitSymbol, formatRange } from "./analog-facts";
import { formatDataType, formatPath, getNodeName, isProperty } from "./member-facts";
import { getNamespaceLabel } from "./namespace-label";
import { useOpenModel } from "./use-model";

/** Undo and redo by keys, `?node=` of the address, and what the open model offers in the palette. Draws nothing. */
export function ModelKeys() {
  useEditKeys();
  useNodeOfAddress();
  useModelPalette();
  return null;
}

function useEditKeys(): void {
  const { actions, view, editor } = useOpenModel();
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent): void => {
      if (!(event.ctrlKey || event.metaKey) || event.altKey) return;
      const target = event.target as Element | null;
      if (target?.closest("input, textarea, select, [contenteditable]")) return;
      const key = event.key.toLowerCase();
      const act = key === "z" ? (event.shiftKey ? () => actions.redo() : () => actions.undo()) : key === "y" ? () => actions.redo() : undefined;
      if (!act) return;
      event.preventDefault();
      act();
    };
    window.addEventListener("keydown", onKeyDown);
    return () => window.removeEventListener("keydown", onKeyDown);
  }, [actions, view, editor]);
}

/** A finding, a search or a link of another page names the node to show. */
function useNodeOfAddress(): void {
  const { view, editor } = useOpenModel();
  const [parameters] = useSearchParams();
  const wanted = parameters.get("node");
  useEffect(() => {
    if (wanted !== null && editor.getState().space.getNode(wanted as NodeKey)) view.reveal(wanted as NodeKey);
  }, [wanted, view, editor]);
}

function useModelPalette(): void {
  const { workspace, editor, view, actions } = useOpenModel();
  const navigate = useNavigate();
  const { pathname } = useLocation();
  const base = `/models/${workspace.model.id}`;
  const isEditor = pathname.startsWith(`${base}/sheet`) || pathname.startsWith(`${base}/register`);

  const source = useCallback<PaletteSource>(
    (query, limit) => {
      const { space } = editor.getState();
      return findNodes(space, query, limit).map(({ node }): PaletteEntry => {
        const isOwn = space.isOwn(node.key);
        const unit = node.nodeClass === "Variable" ? findUnitSymbol(space, node.key) : "";
        const range = node.nodeClass === "Variable" ? formatRange(findRangeOf(space, node.key)) : "";
        const value = [formatDataType(space, node), unit, range].filter((part) => part !== "").join(" ");
        const place = isOwn ? formatPath(space, node.key) : getNamespaceLabel(node.nodeId.namespaceUri);
        return {
          id: node.key,
          label: getNodeName(space, node.key),
          group: isOwn ? "Nodes of this model" : "Nodes of required models",
          hint: value === "" ? place : `${place}  ${value}`,
          glyph: <NodeClassGlyph kind={isProperty(space, node) ? "Property" : node.nodeClass} />,
          isType: node.nodeClass.endsWith("Type"),
          run: () => {
            view.reveal(node.key);
            if (!isEditor) void navigate(`${base}/sheet?node=${encodeURIComponent(node.key)}`);
          },
        };
      });
    },
    [editor, view, navigate, base, isEditor],
  );
  usePaletteSource(source);

  const entries = useMemo<PaletteEntry[]>(() => {
    const go = (path: string) => () => void navigate(`${base}/${path}`);
    const screens = [
      { id: "sheet", label: "Sheet", group: "Screens of this model", run: go("sheet") },
      { id: "register", label: "Register", group: "Screens of this model", run: go("register") },
      { id: "mapping", label: "Mapping", group: "Screens of this model", run: go("mapping") },
      { id: "findings", label: "Findings", group: "Screens of this model", run: go("findings") },
      { id: "source", label: "Source text", group: "Screens of this model", run: go("source") },
      { id: "types", label: "Types", group: "Screens of this model", run: go("types") },
      { id: "revisions", label: "Revisions", group: "Screens of this model", run: go("revisions") },
      { id: "about", label: "About this model", group: "Screens of this model", run: go("about") },
      ...(workspace.model.kind === "machines" ? [{ id: "roll-out", label: "Roll-out", group: "Screens of this model", run: go("roll-out") }] : []),
      { id: "test-server", label: "Test server", group: "Screens of this model", run: go("test-server") },
    ];
    const edits = actions.canEdit || workspace.permissions.includes("mapping.edit")
      ? [
          { id: "undo", label: "Undo", group: "Actions", hint: "Ctrl Z", run: () => actions.undo() },
          { id: "replace", label: "Find and replace", group: "Actions", hint: "Ctrl H", run: go("register?replace") },
          { id: "signals", label: "Add from a signal list", group: "Actions", run: go("signals") },
          { id: "redo", label: "Redo", group: "Actions", hint: "Ctrl Shift Z", run: () => actions.redo() },
        ]
      : [];
    return [...screens, ...edits, { id: "export", label: "Download NodeSet2", group: "Actions", run: () => window.location.assign(`${base}/nodeset`) }];
  }, [navigate, base, actions, workspace.model.kind]);
  usePaletteActions(entries);
}
