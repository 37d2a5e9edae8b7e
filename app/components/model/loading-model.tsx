import { useOpenModel } from "./use-model";

/** While the packs come. */
export function LoadingModel({ what }: { what: string }) {
  const { workspace } = useOpenModel();
  const count = workspace.layers.length;
  return (
    <div className="grid min-h-0 flex-1 place-items-center bg-paper" aria-busy="true" role="status">
      <p className="text-small text-ink-3">
        Loading {what}: {workspace.model.name} with {count} required {count === 1 ? "model" : "models"} …
      </p>
    </div>
  );
}
