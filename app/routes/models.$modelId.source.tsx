import { lazy, Suspense, useEffect } from "react";
import { NodeDrawer } from "~/components/drawer/node-drawer";
import { LoadingModel } from "~/components/model/loading-model";
import { useOpenModel } from "~/components/model/use-model";

const SourceText = lazy(() => import("~/components/xml/source-text.client"));

export function meta() {
  return [{ title: "Source text · Ferrule" }];
}

export default function SourcePage() {
  const { workspace, presence, isReady } = useOpenModel();
  useEffect(() => presence.setPlace("source text"), [presence]);
  const waiting = <LoadingModel what="the source text" />;
  return (
    <main id="main" className="flex min-h-0 flex-1 flex-col">
      <h1 className="sr-only">Source text of {workspace.model.name}</h1>
      {isReady ? (
        <Suspense fallback={waiting}>
          <SourceText />
        </Suspense>
      ) : (
        waiting
      )}
      <NodeDrawer />
    </main>
  );
}
