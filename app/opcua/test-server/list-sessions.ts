import { MessageSecurityMode, UserNameIdentityToken, type OPCUAServer, type ServerSession } from "node-opcua";
import type { ToParentMessage } from "../messages";

type SessionReport = Extract<ToParentMessage, { kind: "sessions" }>["sessions"];

/** Who is connected now, with what load. */
export function listSessions(server: OPCUAServer): SessionReport {
  return server.engine.getSessions().map((session) => ({
    name: session.sessionName || "(without name)",
    user: nameUser(session),
    security: nameSecurity(session),
    since: session.creationDate.toISOString(),
    subscriptions: session.currentSubscriptionCount,
    monitoredItems: session.currentMonitoredItemCount,
  }));
}

function nameUser(session: ServerSession): string {
  const token = session.userIdentityToken;
  return token instanceof UserNameIdentityToken ? (token.userName ?? "") : "anonymous";
}

function nameSecurity(session: ServerSession): string {
  const channel = session.channel;
  if (!channel) return "no channel";
  const policy = channel.securityPolicy.split("#").at(-1) ?? "";
  return channel.securityMode === MessageSecurityMode.None ? "None" : `${policy}, ${MessageSecurityMode[channel.securityMode] ?? ""}`;
}
