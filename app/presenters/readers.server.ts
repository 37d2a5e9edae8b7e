import { listReaders } from "../db/repositories/releases.server";

export type ReaderLine = {
  readonly id: string;
  readonly name: string;
  readonly about: string;
  readonly contact: string;
  readonly nodeIds: readonly string[];
  readonly updatedBy: string;
  readonly updatedAt: string;
};

/** The readers that the team has named, with the nodes that they read. */
export async function presentReaders(organizationId: string): Promise<ReaderLine[]> {
  return (await listReaders(organizationId)).map(({ id, name, about, contact, nodeIds, updatedBy, updatedAt }) => ({
    id,
    name,
    about,
    contact,
    nodeIds,
    updatedBy,
    updatedAt: updatedAt.toISOString(),
  }));
}
