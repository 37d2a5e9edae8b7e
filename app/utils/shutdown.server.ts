/** What must end before the process does. Each owner registers once; they end in reverse order, within one limit of time. */
import { singleton } from "./singleton.server";

type End = { readonly name: string; readonly end: () => void | Promise<void> };

const ends = () => singleton<Map<string, End>>("shutdown", () => new Map());

/** Registers or replaces the end under this name. */
export function onShutdown(name: string, end: End["end"]): void {
  ends().delete(name);
  ends().set(name, { name, end });
}

/** Runs every end, the newest first; one that fails or is late does not keep the others from running. */
export async function runShutdown(limitMs: number): Promise<string[]> {
  const deadline = Date.now() + limitMs;
  const late: string[] = [];
  for (const { name, end } of [...ends().values()].reverse()) {
    const finished = await finishesBefore(end, Math.max(50, deadline - Date.now()));
    if (!finished) late.push(name);
  }
  ends().clear();
  return late;
}

async function finishesBefore(end: End["end"], limitMs: number): Promise<boolean> {
  let timer: NodeJS.Timeout | undefined;
  const limit = new Promise<boolean>((resolve) => {
    timer = setTimeout(() => resolve(false), limitMs);
  });
  try {
    return await Promise.race([Promise.resolve(end()).then(() => true), limit]);
  } catch {
    return false;
  } finally {
    clearTimeout(timer);
  }
}
