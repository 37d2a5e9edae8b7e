/** Figures and times as the screens write them: groups of three apart by a thin space, minus as U+2212. */

const thin = "\u202f";

/** 1318 → `1 318`. */
export function formatCount(value: number): string {
  const text = Math.abs(value).toString().replace(/\B(?=(\d{3})+(?!\d))/g, thin);
  return value < 0 ? `\u2212${text}` : text;
}

const months = ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"];

/** `1 Dec 2026`, in UTC, so that server and browser agree. */
export function formatDate(iso: string | Date): string {
  const date = new Date(iso);
  return `${date.getUTCDate()} ${months[date.getUTCMonth()] ?? ""} ${date.getUTCFullYear()}`;
}

/** How long ago, in the largest unit that says something: `now`, `12 min`, `5 h`, `3 d`. */
export function formatAge(milliseconds: number): string {
  const seconds = Math.max(0, Math.round(milliseconds / 1000));
  if (seconds < 45) return "now";
  const minutes = Math.round(seconds / 60);
  if (minutes < 60) return `${minutes} min`;
  const hours = Math.round(minutes / 60);
  return hours < 48 ? `${hours} h` : `${Math.round(hours / 24)} d`;
}
