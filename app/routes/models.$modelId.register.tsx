import { useEffect } from "react";
import { NodeDrawer } from "~/components/drawer/node-drawer";
import { LoadingModel } from "~/components/model/loading-model";
import { useOpenModel } from "~/components/model/use-model";
import { Register } from "~/components/register/register";

export function meta() {
  return [{ title: "Register · Ferrule" }];
}

export default function RegisterPage() {
  const { workspace, presence, isReady } = useOpenModel();
  useEffect(() => presence.setPlace("register"), [presence]);
  return (
    <main id="main" className="flex min-h-0 flex-1 flex-col">
      <h1 className="sr-only">Register of {workspace.model.name}</h1>
      {isReady ? <Register /> : <LoadingModel what="the register" />}
      <NodeDrawer />
    </main>
  );
}
