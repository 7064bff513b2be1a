import type { Id } from '@/lib/model/id'
import type { Actor, Person } from '@/lib/model/person'
import type { Role } from '@/lib/model/role'
import type { Instant } from '@/lib/model/time'
import type { ShopTx } from '../client'

const people = (tx: ShopTx) =>
  tx
    .selectFrom('person as p')
    .leftJoin('personContact as c', (join) =>
      join.onRef('c.shopId', '=', 'p.shopId').onRef('c.personId', '=', 'p.id'),
    )
    .leftJoin('membership as m', (join) =>
      join
        .onRef('m.shopId', '=', 'p.shopId')
        .onRef('m.personId', '=', 'p.id')
        .on('m.revokedAt', 'is', null),
    )
    .select(['p.id', 'c.name', 'm.roles', 'm.scopeVersion'])
    .where('p.shopId', '=', tx.shopId)
    .where('p.deletedAt', 'is', null)

/** Answers the shop's people with their names; whoever left has no roles, whoever was erased no name. */
export async function listPeople(tx: ShopTx): Promise<Person[]> {
  const rows = await people(tx).orderBy('c.name').execute()
  return rows.map(({ id, name, roles }) => ({ id, name, roles: roles ?? [] }))
}

/** As listPeople, of these ids. */
export async function peopleById(tx: ShopTx, ids: readonly Id[]): Promise<Person[]> {
  if (ids.length === 0) return []
  const rows = await people(tx).where('p.id', 'in', ids).execute()
  return rows.map(({ id, name, roles }) => ({ id, name, roles: roles ?? [] }))
}

/** Answers a person as an actor with today's roles; undefined without a live membership. */
export async function findActor(tx: ShopTx, personId: Id): Promise<Actor | undefined> {
  const row = await people(tx).where('p.id', '=', personId).executeTakeFirst()
  if (!row?.roles) return undefined
  return { shopId: tx.shopId, personId, roles: row.roles, name: row.name }
}

/** Answers roles and scope version of a live membership (P11); undefined when there is none. */
export async function findMembership(
  tx: ShopTx,
  personId: Id,
): Promise<{ roles: Role[]; scopeVersion: number } | undefined> {
  return await tx
    .selectFrom('membership')
    .select(['roles', 'scopeVersion'])
    .where('shopId', '=', tx.shopId)
    .where('personId', '=', personId)
    .where('revokedAt', 'is', null)
    .executeTakeFirst()
}

/** A person with contact, roles and password hash, as the seed and the owner's desk make one. */
export type NewPerson = {
  id: Id
  name: string
  email: string | null
  phone: string | null
  roles: Role[]
  passwordHash: string | null
}

/** Stores people that are new; present ones are left alone. Take a change number for each. */
export async function insertPeople(tx: ShopTx, people: readonly NewPerson[]): Promise<void> {
  if (people.length === 0) return
  const shopId = tx.shopId
  await tx
    .insertInto('person')
    .values(people.map(({ id }) => ({ shopId, id })))
    .onConflict((on) => on.doNothing())
    .execute()
  await tx
    .insertInto('personContact')
    .values(
      people.map(({ id, name, email, phone }) => ({ shopId, personId: id, name, email, phone })),
    )
    .onConflict((on) => on.doNothing())
    .execute()
  await tx
    .insertInto('membership')
    .values(people.map(({ id, roles }) => ({ shopId, personId: id, roles })))
    .onConflict((on) => on.doNothing())
    .execute()
  for (const { id, passwordHash } of people) {
    if (passwordHash !== null) await setPassword(tx, { personId: id, passwordHash })
  }
}

/** Answers the hash of a person's password; undefined when there is none. */
export async function passwordHashOf(tx: ShopTx, personId: Id): Promise<string | undefined> {
  const row = await tx
    .selectFrom('credential')
    .select('passwordHash')
    .where('shopId', '=', tx.shopId)
    .where('personId', '=', personId)
    .executeTakeFirst()
  return row?.passwordHash
}

/** Stores the hash of a person's password in place of the one before. */
export async function setPassword(
  tx: ShopTx,
  { personId, passwordHash }: { personId: Id; passwordHash: string },
): Promise<void> {
  await tx
    .insertInto('credential')
    .values({ shopId: tx.shopId, personId, passwordHash })
    .onConflict((on) => on.columns(['shopId', 'personId']).doUpdateSet({ passwordHash }))
    .execute()
}

/** Sets the roles; the person's phones start over at their next pull. Take a change number (person). */
export async function setRoles(
  tx: ShopTx,
  { personId, roles }: { personId: Id; roles: Role[] },
): Promise<void> {
  await tx
    .updateTable('membership')
    .set({ roles })
    .where('shopId', '=', tx.shopId)
    .where('personId', '=', personId)
    .execute()
}

/** Ends a membership: sign-in, sessions and pulls answer nothing from now on. Take a change number (person). */
export async function revokeMembership(
  tx: ShopTx,
  { personId, now }: { personId: Id; now: Instant },
): Promise<void> {
  await tx
    .updateTable('membership')
    .set({ revokedAt: now })
    .where('shopId', '=', tx.shopId)
    .where('personId', '=', personId)
    .where('revokedAt', 'is', null)
    .execute()
}

/**
 * Erases name, phone and e-mail of a person; the id stays, so every chain still verifies (R23). Take a
 * change number (person).
 */
export async function erasePerson(
  tx: ShopTx,
  { personId, now }: { personId: Id; now: Instant },
): Promise<void> {
  const { shopId } = tx
  for (const table of ['personContact', 'credential'] as const) {
    await tx
      .deleteFrom(table)
      .where('shopId', '=', shopId)
      .where('personId', '=', personId)
      .execute()
  }
  await tx
    .updateTable('person')
    .set({ erasedAt: now })
    .where('shopId', '=', shopId)
    .where('id', '=', personId)
    .execute()
}
