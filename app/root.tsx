import type { ReactNode } from "react";
import { Links, Meta, Outlet, Scripts, ScrollRestoration, useRouteLoaderData } from "react-router";
import type { Route } from "./+types/root";
import interUrl from "@fontsource-variable/inter/files/inter-latin-wght-normal.woff2?url";
import monoUrl from "@fontsource-variable/jetbrains-mono/files/jetbrains-mono-latin-wght-normal.woff2?url";
import { ErrorPage } from "~/components/shell/error-page";
import { Toaster } from "~/components/ui/toast";
import { TooltipProvider } from "~/components/ui/tooltip";
import { usePendingTheme } from "~/components/shell/theme-switch";
import { readTheme } from "~/utils/theme";
import "./app.css";

export const links: Route.LinksFunction = () => [
  { rel: "icon", href: "/icon.svg", type: "image/svg+xml" },
  { rel: "preload", href: interUrl, as: "font", type: "font/woff2", crossOrigin: "anonymous" },
  { rel: "preload", href: monoUrl, as: "font", type: "font/woff2", crossOrigin: "anonymous" },
];

export const meta: Route.MetaFunction = () => [{ title: "Ferrule" }];

export function loader({ request }: Route.LoaderArgs) {
  return { theme: readTheme(request) };
}

export function Layout({ children }: { children: ReactNode }) {
  const loaded = useRouteLoaderData<typeof loader>("root");
  const pending = usePendingTheme();
  return (
    <html lang="en" data-theme={pending ?? loaded?.theme ?? "system"}>
      <head>
        <meta charSet="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <meta name="color-scheme" content="light dark" />
        <Meta />
        <Links />
      </head>
      <body>
        <TooltipProvider>
          {children}
          <Toaster />
        </TooltipProvider>
        <ScrollRestoration />
        <Scripts />
      </body>
    </html>
  );
}

export default function App() {
  return <Outlet />;
}

export function ErrorBoundary({ error }: Route.ErrorBoundaryProps) {
  return (
    <div className="flex h-dvh flex-col">
      <ErrorPage error={error} />
    </div>
  );
}
