import { useEffect } from "react";
import { NodeDrawer } from "~/components/drawer/node-drawer";
import { LoadingModel } from "~/components/model/loading-model";
import { useOpenModel } from "~/components/model/use-model";
import { Register } from "~/components/register/register";

export function meta() {
  return [{ title: "Register · Ferrule" }];
}

export default function RegisterPage() {
  const { presence, isReady } = useOpenModel();
  useEffect(() => presence.setPlace("register"), [presence]);
  return (
    <>
      {isReady ? <Register /> : <LoadingModel what="the register" />}
      <NodeDrawer />
    </>
  );
}
