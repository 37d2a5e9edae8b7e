/** The one route table. Pages inside the frame have the top bar; data routes and the API stand outside it. */
import { index, layout, prefix, route, type RouteConfig } from "@react-router/dev/routes";

export default [
  route("sign-in", "routes/sign-in.tsx"),
  route("set-up", "routes/set-up.tsx"),
  route("sign-out", "routes/sign-out.tsx"),
  route("theme", "routes/theme.tsx"),
  route("organization", "routes/organization.tsx"),
  layout("routes/frame.tsx", [
    route("*", "routes/not-found.tsx"),
  ]),
] satisfies RouteConfig;
