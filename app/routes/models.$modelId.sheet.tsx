import { NodeDrawer } from "~/components/drawer/node-drawer";
import { LoadingModel } from "~/components/model/loading-model";
import { useOpenModel } from "~/components/model/use-model";
import { Sheet } from "~/components/sheet/sheet";

/** The drawing carries the title block itself. */
export const handle = { drawsTitleBlock: true };

export function meta() {
  return [{ title: "Sheet · Ferrule" }];
}

export default function SheetPage() {
  const { workspace, isReady } = useOpenModel();
  return (
    <main id="main" className="flex min-h-0 flex-1 flex-col">
      <h1 className="sr-only">Sheet of {workspace.model.name}</h1>
      {isReady ? <Sheet /> : <LoadingModel what="the sheet" />}
      <NodeDrawer />
    </main>
  );
}
