/** What the text editor knows of NodeSet2: where it folds, and what a name stands for. One registration for the window. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { monaco } from "./load-monaco.client";
import { listFolds } from "./source-folds";
import { describeNamed, findNamed, readTables, type SourceTables } from "./source-names";

const spaces = new Map<string, () => AddressSpace>();
const tables = new WeakMap<monaco.editor.ITextModel, { readonly version: number; readonly tables: SourceTables }>();
let isRegistered = false;

/** From now on names in this text are looked up in the model; answers the function that ends it. */
export function explainNames(model: monaco.editor.ITextModel, getSpace: () => AddressSpace): () => void {
  if (!isRegistered) register();
  isRegistered = true;
  const id = model.uri.toString();
  spaces.set(id, getSpace);
  return () => spaces.delete(id);
}

function register(): void {
  monaco.languages.registerFoldingRangeProvider("xml", {
    provideFoldingRanges: (model) => listFolds(model.getValue()).map(({ start, end }) => ({ start, end })),
  });
  monaco.languages.registerHoverProvider("xml", {
    provideHover: (model, { lineNumber, column }) => {
      const space = spaces.get(model.uri.toString())?.();
      const named = space && findNamed(space, getTables(model), model.getLineContent(lineNumber), column - 1);
      if (!space || !named) return null;
      return {
        range: new monaco.Range(lineNumber, named.from + 1, lineNumber, named.to + 1),
        contents: describeNamed(space, named.node).map((value) => ({ value })),
      };
    },
  });
}

function getTables(model: monaco.editor.ITextModel): SourceTables {
  const version = model.getVersionId();
  const known = tables.get(model);
  if (known?.version === version) return known.tables;
  const read = readTables(model.getValue());
  tables.set(model, { version, tables: read });
  return read;
}
