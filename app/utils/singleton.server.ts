/**
 * Keeps one instance for the life of the process. Hot reload and the two bundles (server.js and the web application)
 * evaluate a module more than once; connections and child processes must not be made again then.
 */
const store = globalThis as unknown as { ferruleSingletons?: Map<string, unknown> };

export function singleton<T>(name: string, make: () => T): T {
  const singletons = (store.ferruleSingletons ??= new Map<string, unknown>());
  if (!singletons.has(name)) singletons.set(name, make());
  return singletons.get(name) as T;
}
