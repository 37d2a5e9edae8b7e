import { useEffect, useState } from "react";
import type { Tag } from "~/domain/mapping/tag";
import type { TagListSummary } from "~/services/import-tags.server";
import { fetchTagLists, fetchTags } from "../sources/tag-lists";

export type RoleTags = {
  readonly lists: readonly TagListSummary[];
  /** Id of the list by role. */
  readonly chosen: Readonly<Record<string, string>>;
  readonly choose: (role: string, id: string) => void;
  /** What suggestions take. */
  readonly tags: readonly { readonly role: string; readonly tags: readonly Tag[] }[];
};

/** Which tag list stands for which role, for suggestions; lists are read when they are chosen. */
export function useTags(): RoleTags {
  const [lists, setLists] = useState<readonly TagListSummary[]>([]);
  const [chosen, setChosen] = useState<Readonly<Record<string, string>>>({});
  const [read, setRead] = useState<ReadonlyMap<string, readonly Tag[]>>(new Map());
  const [tags, setTags] = useState<RoleTags["tags"]>([]);
  useEffect(() => void fetchTagLists().then(setLists), []);
  useEffect(() => {
    setTags(Object.entries(chosen).flatMap(([role, id]) => (read.has(id) ? [{ role, tags: read.get(id) ?? [] }] : [])));
  }, [chosen, read]);
  function choose(role: string, id: string): void {
    const { [role]: _old, ...rest } = chosen;
    setChosen(id === "" ? rest : { ...rest, [role]: id });
    if (id !== "" && !read.has(id))
      void fetchTags(id).then((found) => setRead((before) => new Map([...before, [id, found]])));
  }
  return { lists, chosen, choose, tags };
}
