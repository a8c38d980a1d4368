import { sql } from 'drizzle-orm';
import {
  index,
  integer,
  jsonb,
  pgTable,
  text,
  timestamp,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { cases } from '#server/db/schema/cases.ts';
import { identifications } from '#server/db/schema/identifications.ts';
import { people } from '#server/db/schema/people.ts';
import type { Candidate } from '#shared/contracts/identifications.ts';
import type { Decision, MatchState } from '#shared/contracts/matches.ts';

export const matches = pgTable(
  'matches',
  {
    id: uuid().primaryKey(),
    caseId: uuid('case_id')
      .notNull()
      .references(() => cases.id),
    version: integer().notNull(),
    identificationId: uuid('identification_id')
      .notNull()
      .references(() => identifications.id),
    candidateIndex: integer('candidate_index').notNull(),
    candidate: jsonb().$type<Candidate>().notNull(),
    comment: text().notNull(),
    state: text().$type<MatchState>().notNull(),
    submittedBy: uuid('submitted_by')
      .notNull()
      .references(() => people.id),
    submittedAt: timestamp('submitted_at', { withTimezone: true }).notNull(),
    decision: text().$type<Decision>(),
    decidedBy: uuid('decided_by').references(() => people.id),
    decidedAt: timestamp('decided_at', { withTimezone: true }),
    reason: text(),
    meaning: text(),
  },
  (t) => [
    unique('matches_case_version').on(t.caseId, t.version),
    index('matches_state').on(t.state, t.submittedAt),
    uniqueIndex('matches_one_open')
      .on(t.caseId)
      .where(sql`state = 'submitted'`),
  ],
);
