/** Whether this browser's person has put the three next steps away. */
const cookieName = "ferrule-steps";

export const hiddenStepsCookie = `${cookieName}=hidden; Path=/; Max-Age=31536000; SameSite=Lax`;

export function hidesSteps(request: Request): boolean {
  return (request.headers.get("cookie") ?? "").split(/;\s*/).includes(`${cookieName}=hidden`);
}
