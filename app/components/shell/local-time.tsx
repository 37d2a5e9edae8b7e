import { useSyncExternalStore } from "react";

const months = ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"];
const days = ["Sun", "Mon", "Tue", "Wed", "Thu", "Fri", "Sat"];

const never = () => () => undefined;

/** False while the page is the server's, which does not know the reader's time zone. */
function useHydrated(): boolean {
  return useSyncExternalStore(
    never,
    () => true,
    () => false,
  );
}

export type TimeParts = "date" | "time" | "date-time" | "day-date-time";

function format(date: Date, parts: TimeParts): string {
  const two = (n: number) => String(n).padStart(2, "0");
  const day = `${date.getDate()} ${months[date.getMonth()] ?? ""} ${date.getFullYear()}`;
  const time = `${two(date.getHours())}:${two(date.getMinutes())}`;
  if (parts === "date") return day;
  if (parts === "time") return time;
  return parts === "date-time" ? `${day}, ${time}` : `${days[date.getDay()] ?? ""} ${day}, ${time}`;
}

/** A moment in the reader's own time. The server writes it in UTC, marked so. */
export function LocalTime({ iso, parts = "date-time" }: { iso: string; parts?: TimeParts }) {
  const hydrated = useHydrated();
  const date = new Date(iso);
  const text = hydrated ? format(date, parts) : toUtcText(date, parts);
  return <time dateTime={iso}>{text}</time>;
}

function toUtcText(date: Date, parts: TimeParts): string {
  const shifted = new Date(date.getTime() + date.getTimezoneOffset() * 60_000);
  return parts === "date" ? format(shifted, parts) : `${format(shifted, parts)} UTC`;
}
