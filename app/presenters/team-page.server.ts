/** People and the newest audit entries of an organisation, as far as the caller may see them. */
import { mayDo, type Caller } from "../auth/caller.server";
import { listAudit } from "../db/repositories/audit.server";
import { listPeople, type Membership, type Person } from "../db/repositories/people.server";

export type AuditLine = {
  readonly id: number;
  readonly at: string;
  readonly who: string;
  readonly action: string;
  readonly subject: string;
};

export type TeamPage = {
  readonly organizationName: string;
  readonly userId: string;
  readonly people: readonly Person[];
  readonly audit: readonly AuditLine[];
  readonly mayAdminister: boolean;
};

const MAX_AUDIT = 40;

export async function readTeamPage(
  caller: Caller,
  { organizationId, organizationName }: Membership,
): Promise<TeamPage> {
  const mayAdminister = mayDo(caller, "organization.administer", organizationId);
  const [people, audit] = await Promise.all([
    listPeople(organizationId),
    mayAdminister ? listAudit(organizationId, MAX_AUDIT) : [],
  ]);
  return {
    organizationName,
    userId: caller.userId,
    people,
    audit: audit.map(({ id, at, userName, action, subjectName }) => ({
      id,
      at: at.toISOString(),
      who: userName,
      action,
      subject: subjectName,
    })),
    mayAdminister,
  };
}
