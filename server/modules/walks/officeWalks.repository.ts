import { and, desc, eq, ilike, inArray, or, sql } from 'drizzle-orm';
import type { WalkStateName } from '@shared/contracts/walkRow.contract';
import { jobJoints, jobs } from '@db/schema/jobs';
import { people } from '@db/schema/people';
import { procedures } from '@db/schema/procedures';
import { proofs } from '@db/schema/proofs';
import { walkHands, walks } from '@db/schema/walks';
import { alias } from 'drizzle-orm/pg-core';
import type { ShopTx } from '../../tenancy/withShop';

const pulling = alias(people, 'pulling');
const recording = alias(people, 'recording');

/** Which walks an office list shows. */
export interface WalkFilter {
  id?: string;
  state?: WalkStateName | undefined;
  /** Signed walks in which this person took no reading (or whose shop is of one). */
  countersignableBy?: string | undefined;
  q: string;
  limit: number;
}

const takenBy = (person: string) =>
  sql`exists (select from ${walkHands} h where h.shop_id = ${walks.shopId} and h.walk_id = ${walks.id} and h.person_id = ${person})`;

const containing = (q: string) => {
  const pattern = `%${q.replaceAll('\\', '\\\\').replaceAll('%', '\\%').replaceAll('_', '\\_')}%`;
  const columns = [jobs.number, jobs.customer, jobs.engineSerial, jobs.engineModel, jobs.vin, walks.procedureCode];
  return or(...columns.map((column) => ilike(column, pattern)));
};

const conditions = (tx: ShopTx, filter: WalkFilter) =>
  and(
    eq(walks.shopId, tx.shop),
    filter.id === undefined ? undefined : eq(walks.id, filter.id),
    filter.state === undefined ? undefined : eq(walks.state, filter.state),
    filter.countersignableBy === undefined
      ? undefined
      : and(eq(walks.state, 'signed'), or(eq(walks.shopOfOne, true), sql`not ${takenBy(filter.countersignableBy)}`)),
    filter.q === '' ? undefined : containing(filter.q),
  );

/** Walks with the words that make them findable, last changed first. */
export const findOfficeWalks = (tx: ShopTx, filter: WalkFilter) =>
  tx.db
    .select({
      walk: walks,
      job: jobs,
      joint: jobJoints,
      procedureTitle: procedures.title,
      pullsName: pulling.name,
      recordsName: recording.name,
    })
    .from(walks)
    .innerJoin(jobs, and(eq(jobs.shopId, walks.shopId), eq(jobs.id, walks.jobId)))
    .innerJoin(jobJoints, and(eq(jobJoints.shopId, walks.shopId), eq(jobJoints.id, walks.jointId)))
    .leftJoin(procedures, and(eq(procedures.shopId, walks.shopId), eq(procedures.code, walks.procedureCode)))
    .leftJoin(pulling, and(eq(pulling.shopId, walks.shopId), eq(pulling.id, walks.pulls)))
    .leftJoin(recording, and(eq(recording.shopId, walks.shopId), eq(recording.id, walks.records)))
    .where(conditions(tx, filter))
    .orderBy(desc(walks.changedAt))
    .limit(filter.limit);

/** The latest proof of each of these walks. */
export const latestProofs = async (
  tx: ShopTx,
  walkIds: string[],
): Promise<Map<string, { id: string; number: string; state: string }>> => {
  const found = new Map<string, { id: string; number: string; state: string }>();
  if (walkIds.length === 0) return found;
  const rows = await tx.db
    .select({ walk: proofs.walkId, id: proofs.id, number: proofs.number, state: proofs.state })
    .from(proofs)
    .where(and(eq(proofs.shopId, tx.shop), inArray(proofs.walkId, walkIds)))
    .orderBy(proofs.issuedAt);
  for (const { walk, ...proof } of rows) found.set(walk, proof);
  return found;
};
