/** The one route table. Pages inside the frame have the top bar; data routes and the API stand outside it. */
import { index, layout, prefix, route, type RouteConfig } from "@react-router/dev/routes";

export default [
  route("sign-in", "routes/sign-in.tsx"),
  route("set-up", "routes/set-up.tsx"),
  route("sign-out", "routes/sign-out.tsx"),
  route("theme", "routes/theme.tsx"),
  route("organization", "routes/organization.tsx"),
  route("api/v1/models/:modelId/test-servers", "routes/api/test-servers.ts"),
  route("api/v1/test-servers/:testServerId", "routes/api/test-server.ts"),
  route("live/:testServerId/children", "routes/data/live-children.ts"),
  route("live/:testServerId/node", "routes/data/live-node.ts"),
  route("events", "routes/data/events.ts"),
  route("events/topics", "routes/data/event-topics.ts"),
  route("packs/:hash", "routes/data/pack.ts"),
  ...prefix("models/:modelId", [
    route("pack", "routes/data/model-pack.ts"),
    route("layers", "routes/data/model-layers.ts"),
    route("transactions", "routes/data/model-transactions.ts"),
    route("lease", "routes/data/model-lease.ts"),
    route("presence", "routes/data/model-presence.ts"),
    route("nodeset", "routes/data/model-nodeset.ts"),
    route("sheets", "routes/data/model-sheets.ts"),
    route("sheets/:sheetId", "routes/data/model-sheet.ts"),
  ]),
  ...prefix("api", [
    route("auth/*", "routes/api/auth.ts"),
  ]),
  layout("routes/frame.tsx", [
    route("*", "routes/not-found.tsx"),
  ]),
] satisfies RouteConfig;
