import type { Database } from '#server/db/client'
import type { GroupClass } from '#shared/pricing/rate-card'
import { groupMemberships, groups, people } from '#server/db/schema'
import { hashPassword } from '#server/services/people/password'

/** One password for all demo accounts, printed by `npm run demo`; a facility's own people set theirs. */
export const DEMO_PASSWORD = 'basin of cold helium'

const GROUPS: { name: string, class: GroupClass, institution: string, addressLines: string[], vatId: string | null, costCodes: string[], capMinor: number | null, reverseCharge?: boolean }[] = [
  { name: 'Alder', class: 'academic', institution: 'University of Tarn', addressLines: ['Physics Building 2', 'Tarn Road 40', '7030 Tarn'], vatId: null, costCodes: [], capMinor: 4_500_000 },
  { name: 'Birch', class: 'internal', institution: 'Skerry Institute', addressLines: ['Quay House 1', '5003 Skerry'], vatId: null, costCodes: ['SK-4410', 'SK-4477'], capMinor: 6_000_000 },
  { name: 'Cedar', class: 'academic', institution: 'Fjell Technical College', addressLines: ['Laboratory Lane 9', '9010 Fjell'], vatId: null, costCodes: [], capMinor: 3_000_000 },
  { name: 'Hazel', class: 'internal', institution: 'Skerry Institute', addressLines: ['Quay House 2', '5003 Skerry'], vatId: null, costCodes: ['SK-5120'], capMinor: null },
  { name: 'Rowan Materials', class: 'industry', institution: 'Rowan Materials Ltd', addressLines: ['Works Road 7', '2100 Strand'], vatId: 'DK 00 00 00 00', costCodes: [], capMinor: null, reverseCharge: true },
]

/** Who signs in, and as what the demo lists them; invented people. */
const PEOPLE: { as: string, name: string, email: string, isManager?: boolean, isOperator?: boolean, timeZone?: string, groups?: Record<string, 'member' | 'pi'> }[] = [
  { as: 'manager', name: 'Ingrid Vale', email: 'manager@skerry.example', isManager: true },
  { as: 'operator', name: 'Tobias Kern', email: 'operator@skerry.example', isOperator: true },
  { as: 'operator, second shift', name: 'Maren Holt', email: 'operator2@skerry.example', isOperator: true },
  { as: 'visiting user, Alder group (academic)', name: 'Lena Moss', email: 'lena@alder.example', groups: { Alder: 'member' } },
  { as: 'PI, Alder group (academic)', name: 'Ruth Alderman', email: 'pi@alder.example', groups: { Alder: 'pi' } },
  { as: 'visiting user, Birch group (internal)', name: 'Jonas Reed', email: 'jonas@birch.example', groups: { Birch: 'member' } },
  { as: 'PI, Birch group (internal)', name: 'Selma Birk', email: 'pi@birch.example', groups: { Birch: 'pi', Hazel: 'member' } },
  { as: 'visiting user, Rowan Materials (industry)', name: 'Oscar Lind', email: 'oscar@rowan.example', groups: { 'Rowan Materials': 'member' }, timeZone: 'Europe/London' },
  { as: 'PI, Rowan Materials (industry)', name: 'Edith Rowan', email: 'pi@rowan.example', groups: { 'Rowan Materials': 'pi' } },
  { as: 'visiting user, Cedar group (academic)', name: 'Aino Salo', email: 'aino@cedar.example', groups: { Cedar: 'member' } },
  { as: 'PI, Cedar group (academic)', name: 'Karl Cederholm', email: 'pi@cedar.example', groups: { Cedar: 'pi' } },
  { as: 'PI, Hazel group (internal)', name: 'Nora Hassel', email: 'pi@hazel.example', groups: { Hazel: 'pi' } },
]

/** People and groups by name, for the rest of the seed. */
export interface SeededPeople {
  managerId: string
  operatorIds: string[]
  groups: (typeof groups.$inferSelect & { memberId: string, piId: string })[]
  signIns: { as: string, email: string, password: string }[]
}

/** Groups of the three classes and people of every role. */
export async function seedPeople(db: Database): Promise<SeededPeople> {
  const passwordHash = await hashPassword(DEMO_PASSWORD)
  const groupRows = await db.insert(groups).values(GROUPS.map(group => ({ ...group, reverseCharge: group.reverseCharge ?? false, invoiceEmail: `accounts@${group.name.split(' ')[0]!.toLowerCase()}.example` }))).returning()
  const personRows = await db.insert(people).values(PEOPLE.map(({ as: _, groups: __, ...person }) => ({ ...person, passwordHash }))).returning()
  const personId = (email: string) => personRows.find(person => person.email === email)!.id
  const memberships = PEOPLE.flatMap(person => Object.entries(person.groups ?? {}).map(([name, role]) => ({ groupId: groupRows.find(group => group.name === name)!.id, personId: personId(person.email), role })))
  await db.insert(groupMemberships).values(memberships)
  return {
    managerId: personId('manager@skerry.example'),
    operatorIds: [personId('operator@skerry.example'), personId('operator2@skerry.example')],
    groups: groupRows.map((group) => {
      const of = memberships.filter(membership => membership.groupId === group.id)
      const pi = of.find(membership => membership.role === 'pi')!
      return { ...group, piId: pi.personId, memberId: (of.find(membership => membership.role === 'member') ?? pi).personId }
    }),
    signIns: PEOPLE.map(({ as, email }) => ({ as, email, password: DEMO_PASSWORD })),
  }
}
