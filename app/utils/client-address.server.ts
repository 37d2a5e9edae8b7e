/** The header in which server.ts tells the client's address; it overwrites whatever a client sends under this name. */
export const CLIENT_ADDRESS_HEADER = "x-ferrule-client-address";

export function getClientAddress(request: Request): string {
  return request.headers.get(CLIENT_ADDRESS_HEADER) ?? "unknown";
}
