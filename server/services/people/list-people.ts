import { eq, sql } from 'drizzle-orm'
import type { PersonItem } from '#shared/types/facility'
import type { Database } from '#server/db/client'
import { groupMemberships, groups, people, sessions } from '#server/db/schema'

/** Everyone who may sign in, with roles, groups and when they were last here. */
export async function listPeople(db: Database): Promise<PersonItem[]> {
  const rows = await db.select({
    person: people,
    groups: sql<{ name: string, role: string }[]>`coalesce((select json_agg(json_build_object('name', ${groups.name}, 'role', ${groupMemberships.role}) order by ${groups.name}) from ${groupMemberships} join ${groups} on ${groups.id} = ${groupMemberships.groupId} where ${groupMemberships.personId} = ${people.id}), '[]')`,
    lastSeenAt: sql<string | null>`max(${sessions.lastSeenAt})`,
  }).from(people).leftJoin(sessions, eq(sessions.personId, people.id)).groupBy(people.id).orderBy(people.name)
  return rows.map(({ person, groups: memberships, lastSeenAt }) => ({
    id: person.id, name: person.name, email: person.email, isDisabled: person.disabledAt !== null,
    roles: [...(person.isManager ? ['manager'] : []), ...(person.isOperator ? ['operator'] : [])],
    groups: memberships.map(({ name, role }) => role === 'pi' ? `${name} (PI)` : name),
    lastSeenAt: lastSeenAt === null ? null : new Date(lastSeenAt).toISOString(),
  }))
}
