import { data, redirect } from "react-router";
import type { Route } from "./+types/theme";
import { formatThemeCookie, isTheme } from "~/utils/theme";

export async function action({ request }: Route.ActionArgs) {
  const theme = (await request.formData()).get("theme");
  if (!isTheme(theme)) return new Response("Unknown theme", { status: 400 });
  return data(null, { headers: { "set-cookie": formatThemeCookie(theme) } });
}

export function loader() {
  return redirect("/");
}
