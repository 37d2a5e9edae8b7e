import { Outlet, useRouteLoaderData } from "react-router";
import type { Route } from "./+types/frame";
import { requireUser } from "~/auth/caller.server";
import { CommandPalette } from "~/components/palette/command-palette";
import { openPalette } from "~/components/palette/palette-store";
import { ErrorPage } from "~/components/shell/error-page";
import { FrameActions } from "~/components/shell/frame-actions";
import { TopBar } from "~/components/shell/top-bar";
import { readFrame } from "~/presenters/frame.server";
import type { loader as rootLoader } from "~/root";

export async function loader({ request }: Route.LoaderArgs) {
  return readFrame(request, await requireUser(request));
}

export default function Frame({ loaderData }: Route.ComponentProps) {
  const root = useRouteLoaderData<typeof rootLoader>("root");
  return (
    <div className="flex h-dvh flex-col">
      <TopBar frame={loaderData} theme={root?.theme ?? "system"} onFind={openPalette} />
      <div className="flex min-h-0 flex-1 flex-col">
        <Outlet />
      </div>
      <FrameActions frame={loaderData} />
      <CommandPalette />
    </div>
  );
}

/** Errors of the pages inside keep the bar above them, when the bar's own data could be read. */
export function ErrorBoundary({ error, loaderData }: Route.ErrorBoundaryProps) {
  const root = useRouteLoaderData<typeof rootLoader>("root");
  return (
    <div className="flex h-dvh flex-col">
      {loaderData ? <TopBar frame={loaderData} theme={root?.theme ?? "system"} onFind={openPalette} /> : null}
      <ErrorPage error={error} />
    </div>
  );
}
