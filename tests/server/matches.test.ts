import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoPassword, demoPeople } from '#server/demo/demo-people.ts';
import { listAudit } from '#shared/contracts/audit.ts';
import { addBench } from '#shared/contracts/benches.ts';
import { getCase, openCase, reopenCase } from '#shared/contracts/cases.ts';
import { uploadExposure, withdrawExposure } from '#shared/contracts/exposures.ts';
import { listMail } from '#shared/contracts/mail.ts';
import {
  decideMatch,
  getMatch,
  listMatches,
  signatureMeanings,
  submitMatch,
  type Decision,
} from '#shared/contracts/matches.ts';
import { editPerson, listPeople } from '#shared/contracts/people.ts';
import type { Caller } from '#tests/support/caller.ts';
import { benchDraft, caseDraft, identifiedCase, pinholePicture } from '#tests/support/specimens.ts';
import { rememberingEngine } from '#tests/support/remembering-engine.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
let analyst: Caller;
let reviewer: Caller;
let both: Caller;
beforeAll(async () => {
  app = await createTestApp({ engine: rememberingEngine() });
  [analyst, reviewer, both] = await Promise.all([
    app.signInAs('analyst'),
    app.signInAs('reviewer'),
    app.signInAs('both'),
  ]);
});
afterAll(() => app.close());

const nobody = '00000000-0000-4000-8000-00000000ffff';
const sign = (matchId: string, decision: Decision, more: object = {}) => ({
  params: { matchId },
  body: { decision, password: demoPassword, reason: decision === 'confirm' ? '' : 'Look again.', ...more },
});

async function submitted(by: Caller = analyst) {
  const { caseId, exposure, identification } = await identifiedCase(by);
  const input = { params: { caseId }, body: { identificationId: identification.id, candidateIndex: 0 } };
  const match = await by.call(submitMatch, { ...input, body: { ...input.body, comment: 'One shape fits.' } });
  return { caseId, exposure, identification, input, match };
}

describe('a match put forward', () => {
  it('keeps a copy of its candidate with what the identification says, and waits for a reviewer', async () => {
    const { match, identification, caseId } = await submitted();
    const { outcome } = identification;
    if (outcome?.kind !== 'answer') throw new Error('no answer');
    expect(match).toMatchObject({
      caseId,
      version: 1,
      state: 'submitted',
      candidateIndex: 0,
      candidate: outcome.candidates[0],
      verdict: outcome.verdict,
      untold: outcome.untold,
      comment: 'One shape fits.',
      submittedBy: { id: demoPeople.analyst.id },
      decision: null,
      can: { decide: false },
    });
    const forReviewer = await reviewer.call(getMatch, { params: { matchId: match.id } });
    expect(forReviewer).toMatchObject({ can: { decide: true }, whyNot: null, earlier: [] });
    const waiting = await reviewer.call(listMatches, { query: { mine: 'decide' } });
    expect(waiting.rows.map((m) => m.id)).toContain(match.id);
    expect((await analyst.call(listMatches, { query: { mine: 'decide' } })).rows).toEqual([]);
  });

  it('needs a candidate that exists, of an identification that has an answer, of this very case', async () => {
    const { caseId, identification } = await identifiedCase(analyst);
    const other = await analyst.call(openCase, { body: caseDraft });
    const body = { identificationId: identification.id, candidateIndex: 0 };
    const beyond = await analyst.refused(submitMatch, 'invalid-input', {
      params: { caseId },
      body: { ...body, candidateIndex: 49 },
    });
    expect(beyond.errors?.[0].pointer).toBe('#/candidateIndex');
    for (const candidateIndex of [-1, 0.5, '0', 1e9])
      await analyst.refused(submitMatch, 'invalid-input', {
        params: { caseId },
        body: { ...body, candidateIndex },
      });
    await analyst.refused(submitMatch, 'not-found-or-not-yours', { params: { caseId: other.id }, body });
    await analyst.refused(submitMatch, 'not-found-or-not-yours', {
      params: { caseId },
      body: { ...body, identificationId: nobody },
    });
    await analyst.refused(submitMatch, 'not-found-or-not-yours', { params: { caseId: nobody }, body });
    expect((await analyst.call(getCase, { params: { caseId } })).state).toBe('open');
  });

  it('does not stand on an exposure that is withdrawn', async () => {
    const { caseId, exposure, identification } = await identifiedCase(analyst);
    await analyst.call(withdrawExposure, {
      params: { exposureId: exposure.id },
      body: { reason: 'Wrong specimen.' },
    });
    const body = { identificationId: identification.id, candidateIndex: 0 };
    await analyst.refused(submitMatch, 'wrong-state', { params: { caseId }, body });
  });

  it('is the only open one of its case, also when two are put forward at the same moment', async () => {
    const { caseId, identification } = await identifiedCase(analyst);
    const input = { params: { caseId }, body: { identificationId: identification.id, candidateIndex: 0 } };
    const answers = await Promise.all([analyst.send(submitMatch, input), both.send(submitMatch, input)]);
    expect(answers.map((a) => a.status).sort()).toEqual([201, 409]);
    await analyst.refused(submitMatch, 'wrong-state', input);
  });
});

describe('a decision', () => {
  it('is never made by whoever put the match forward, whatever their roles', async () => {
    const { match } = await submitted(both);
    expect(match.can.decide).toBe(false);
    expect(match.whyNot).toContain('yourself');
    await both.refused(decideMatch, 'own-match', sign(match.id, 'confirm'));
    expect((await both.call(listMatches, { query: { mine: 'decide' } })).rows.map((m) => m.id)).not.toContain(
      match.id,
    );
    await reviewer.call(decideMatch, sign(match.id, 'confirm'));
  });

  it('needs the right password, and nothing is signed with a wrong one', async () => {
    const { match } = await submitted();
    const { errors } = await reviewer.refused(
      decideMatch,
      'wrong-password',
      sign(match.id, 'confirm', { password: 'not mine' }),
    );
    expect(errors?.[0].pointer).toBe('#/password');
    await reviewer.refused(decideMatch, 'invalid-input', sign(match.id, 'confirm', { password: '' }));
    expect((await reviewer.call(getMatch, { params: { matchId: match.id } })).state).toBe('submitted');
  });

  it.each(['return', 'reject'] as const)('to %s needs a reason', async (decision) => {
    const { match } = await submitted();
    for (const reason of ['', '   ', undefined]) {
      const { errors } = await reviewer.refused(
        decideMatch,
        'invalid-input',
        sign(match.id, decision, { reason }),
      );
      expect(errors?.map((e) => e.pointer)).toEqual(['#/reason']);
    }
    const decided = await reviewer.call(decideMatch, sign(match.id, decision));
    expect(decided.decision).toMatchObject({ decision, reason: 'Look again.' });
  });

  it.each([
    ['confirm', 'confirmed', 'closed'],
    ['return', 'returned', 'open'],
    ['reject', 'rejected', 'open'],
  ] as const)(
    'to %s is kept with its meaning, told to the analyst and recorded',
    async (decision, state, caseState) => {
      const { match, caseId } = await submitted();
      const decided = await reviewer.call(decideMatch, sign(match.id, decision));
      expect(decided).toMatchObject({
        state,
        decision: { decision, by: { id: demoPeople.reviewer.id }, meaning: signatureMeanings[decision] },
        can: { decide: false },
      });
      expect((await analyst.call(getCase, { params: { caseId } })).state).toBe(caseState);
      const administrator = await app.signInAs('administrator');
      const { rows: events } = await administrator.call(listAudit, { query: { q: `${decision}-match` } });
      expect(events[0]).toMatchObject({
        subjectId: match.id,
        by: { id: demoPeople.reviewer.id },
        detail: { meaning: signatureMeanings[decision] },
      });
      const { rows: outbox } = await administrator.call(listMail);
      expect(outbox[0]).toMatchObject({ to: demoPeople.analyst.email, state: 'held' });
      expect(outbox[0].subject).toContain(match.caseNumber);
      expect(outbox[0].subject).toContain(state);
      expect(outbox[0].text).toContain(`/cases/${caseId}`);
      if (decision !== 'confirm') expect(outbox[0].text).toContain('Look again.');
    },
  );

  it('is made once: of several at the same moment one counts, and a later one is refused', async () => {
    const { match } = await submitted();
    const answers = await Promise.all([
      reviewer.send(decideMatch, sign(match.id, 'confirm')),
      both.send(decideMatch, sign(match.id, 'return')),
      reviewer.send(decideMatch, sign(match.id, 'reject')),
    ]);
    expect(answers.map((a) => a.status).sort()).toEqual([200, 409, 409]);
    const { rows } = await app.client.pool.query(
      "select 1 from audit_events where subject_id = $1 and event like '%-match' and event <> 'submit-match'",
      [match.id],
    );
    expect(rows).toHaveLength(1);
    await both.refused(decideMatch, 'wrong-state', sign(match.id, 'reject'));
  });

  it('that confirms takes the place of an earlier confirmed match, which stays readable', async () => {
    const { match: first, caseId, input } = await submitted();
    await reviewer.call(decideMatch, sign(first.id, 'confirm'));
    await analyst.refused(submitMatch, 'wrong-state', input);
    await analyst.call(reopenCase, { params: { caseId }, body: { reason: 'New question.' } });
    const second = await analyst.call(submitMatch, input);
    expect((await reviewer.call(getMatch, { params: { matchId: first.id } })).state).toBe('confirmed');
    await reviewer.call(decideMatch, sign(second.id, 'confirm'));
    const read = await reviewer.call(getMatch, { params: { matchId: second.id } });
    expect(read).toMatchObject({
      version: 2,
      state: 'confirmed',
      earlier: [{ id: first.id, state: 'superseded', version: 1 }],
    });
  });

  it('is not made on a match that does not exist', async () => {
    await reviewer.refused(decideMatch, 'not-found-or-not-yours', sign(nobody, 'confirm'));
  });

  it.each([{ decision: 'approve' }, { decision: undefined }, { reason: 'x'.repeat(2001) }, { reason: 7 }])(
    'with %j is refused at the field',
    async (wrong) => {
      const { errors } = await reviewer.refused(decideMatch, 'invalid-input', sign(nobody, 'return', wrong));
      expect(errors?.[0].pointer).toBe(`#/${Object.keys(wrong)[0]}`);
    },
  );

  it('of somebody who lost the role meanwhile is refused', async () => {
    const { match } = await submitted();
    const administrator = await app.signInAs('administrator');
    const { people } = await administrator.call(listPeople);
    const { id, name, version } = people.find((p) => p.id === demoPeople.both.id)!;
    const change = (roles: string[], v: number) =>
      administrator.call(editPerson, {
        params: { personId: id },
        body: { name, roles, active: true, version: v },
      });
    await change(['analyst'], version);
    await both.refused(decideMatch, 'not-permitted', sign(match.id, 'confirm'));
    await change(['analyst', 'reviewer'], version + 1);
    await both.call(decideMatch, sign(match.id, 'confirm'));
  });
});

describe('the review table', () => {
  it('shows open matches first and oldest first, and filters by state, case and words', async () => {
    const a = await submitted();
    const b = await submitted();
    await reviewer.call(decideMatch, sign((await submitted()).match.id, 'reject'));
    const { rows } = await reviewer.call(listMatches, { query: { pageSize: 200 } });
    const open = rows.filter((m) => m.state === 'submitted');
    expect(rows.slice(0, open.length)).toEqual(open);
    const order = open.map((m) => m.id);
    expect(order.indexOf(a.match.id)).toBeLessThan(order.indexOf(b.match.id));
    const rejected = await reviewer.call(listMatches, { query: { state: 'rejected' } });
    expect(new Set(rejected.rows.map((m) => m.state))).toEqual(new Set(['rejected']));
    const ofCase = await reviewer.call(listMatches, { query: { caseId: b.caseId } });
    expect(ofCase.rows.map((m) => m.id)).toEqual([b.match.id]);
    const byWords = await reviewer.call(listMatches, { query: { q: b.match.caseNumber.toLowerCase() } });
    expect(byWords.rows.map((m) => m.id)).toEqual([b.match.id]);
    await reviewer.refused(listMatches, 'invalid-input', { query: { caseId: 'x' } });
  });
});

it('a run that is not done cannot be put forward', async () => {
  const idle = await createTestApp({ idle: true });
  const caller = await idle.signInAs('analyst');
  const bench = await caller.call(addBench, { body: benchDraft });
  const { id: caseId } = await caller.call(openCase, { body: caseDraft });
  const exposure = await caller.call(uploadExposure, {
    params: { caseId },
    body: { benchId: bench.id },
    file: pinholePicture(),
  });
  const body = { identificationId: exposure.latest!.identificationId, candidateIndex: 0 };
  await caller.refused(submitMatch, 'wrong-state', { params: { caseId }, body });
  await idle.close();
});

it('guessing the password of a signature is stopped after ten attempts, for that person alone', async () => {
  const { match } = await submitted();
  for (let i = 0; i < 10; i++)
    await reviewer.send(decideMatch, sign(match.id, 'confirm', { password: `guess ${i}` }));
  await reviewer.refused(decideMatch, 'too-many-attempts', sign(match.id, 'confirm'));
  await both.call(decideMatch, sign(match.id, 'confirm'));
});
