/** A path of our own to go back to after signing in or switching; anything else, other origins first of all, leads home. */
export function toSafePath(wanted: FormDataEntryValue | null | undefined): string {
  if (typeof wanted !== "string" || !wanted.startsWith("/") || /^\/[\\/]|[\\\s]/.test(wanted)) return "/";
  return wanted;
}
