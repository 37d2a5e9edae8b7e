import { useEffect, useState } from "react";
import { useSearchParams } from "react-router";

export type SearchState = {
  readonly get: (name: string) => string | undefined;
  /** Undefined takes a parameter away. */
  readonly set: (changes: Readonly<Record<string, string | undefined>>) => void;
};

/** What is open, kept in the address; a choice shows at once, the address follows. */
export function useSearchState(): SearchState {
  const [search, setSearch] = useSearchParams();
  const [shown, setShown] = useState(search);
  const address = search.toString();
  useEffect(() => setShown(new URLSearchParams(address)), [address]);
  function set(changes: Readonly<Record<string, string | undefined>>): void {
    const next = new URLSearchParams(shown);
    for (const [name, value] of Object.entries(changes)) {
      if (value === undefined || value === "") next.delete(name);
      else next.set(name, value);
    }
    setShown(next);
    setSearch(next, { replace: true, preventScrollReset: true });
  }
  return { get: (name) => shown.get(name) ?? undefined, set };
}
