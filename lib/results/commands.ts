import { type RawBuilder, sql } from 'kysely';
import { record } from '@/lib/audit/commands';
import { type Context, accountId, inTransaction, type LockingContext } from '@/lib/context';
import { isId } from '@/lib/ids';
import { done, notFound, refuse, type Result } from '@/lib/result';
import type { PartMarking } from '@/lib/templates/kinds/kind';
import { sittingFacts } from './facts';
import { markPaperIn } from './marking';
import { PaperTemplates } from './paper-templates';
import type { ClaimInput, OverrideInput, WithholdInput } from './model';
import { decidesClaims, keepsRecords, marksSitting } from './relation';
import { renewResult } from './result-of';
import { type Condition, nextResult, releaseConditions, type ResultEvent, type ResultFacts, sealConditions, type SittingFacts } from './rules';
import { newestResult, type ResultRow, storeMarks, storeResult, totalsIn } from './store';

const factsIn = (row: ResultRow): ResultFacts => ({ state: row.state as ResultFacts['state'], withheld: row.withheld });

/** The sitting of a candidate under lock, then the candidate, if the relation holds: the order in which every command locks. */
async function lockCandidate(context: LockingContext, candidateId: string, relation: RawBuilder<boolean>) {
  if (!isId(candidateId)) return undefined;
  const sitting = await context.db
    .selectFrom('sitting').where('sitting.id', '=', (of) => of.selectFrom('candidate').select('sitting_id').where('id', '=', candidateId)).where(relation)
    .select('sitting.id').forUpdate().executeTakeFirst();
  return sitting && context.db.selectFrom('candidate').selectAll().where('id', '=', candidateId).forUpdate().executeTakeFirst();
}

/** Gives a part other marks, with the reason: a new issue of the mark, and of the result. Not after sealing. */
export async function overrideMark(context: Context, input: OverrideInput): Promise<Result<null>> {
  const me = accountId(context.actor);
  return inTransaction(context, async (locked) => {
    const candidate = await lockCandidate(locked, input.candidateId, marksSitting(context.actor));
    const before = candidate && (await newestResult(locked.db, candidate.id));
    if (!me || !candidate || !before) return notFound();
    const mark = await locked.db
      .selectFrom('mark').selectAll().where('candidate_id', '=', candidate.id).where('question', '=', input.question).where('part', '=', input.part)
      .orderBy('issue', 'desc').limit(1).executeTakeFirst();
    if (!mark) return notFound();
    const next = nextResult(factsIn(before), 'override');
    if (!next.ok) return next;
    if (mark.issue !== input.issue) return refuse('changed-since', 'This part was marked again meanwhile. Look at the new mark first; what you wrote is still here.');
    if (input.awarded > mark.of) return refuse('too-many', `This part has ${mark.of} marks at most.`, 'awarded');
    await storeMarks(locked, candidate.id, [{
      question: mark.question, issue: mark.issue + 1, answer: mark.answer, marker: { id: me, reason: input.reason },
      marking: {
        part: mark.part, awarded: input.awarded, of: mark.of, verdict: verdictOf(input.awarded, mark), rule: 'person',
        key: mark.key as unknown as PartMarking['key'], reads: mark.reads as unknown as PartMarking['reads'] | null, says: saysOf(mark),
      },
    }]);
    await renewResult(locked, candidate.id, before, next.value, { sat: true, why: input.reason });
    return done(null);
  });
}

type Judged = { of: number; verdict: string; says: string };

/** A marker's decision as a verdict: all marks right, some a misstep, none wrong; blank stays blank. */
function verdictOf(awarded: number, { of, verdict }: Judged) {
  if (awarded >= of) return 'correct';
  if (awarded > 0) return 'misstep';
  return verdict === 'blank' || verdict === 'unread' ? verdict : 'wrong';
}
/** What the automatic marking said stays, unless it only passed the part on. */
const saysOf = ({ verdict, says }: Judged): string => (verdict === 'for-marker' ? '' : says);

/** Decides whether an answer that came after the end counts, with the reason; taken ones are marked again. Only until the release. */
export async function decideClaim(context: Context, input: ClaimInput): Promise<Result<null>> {
  const me = accountId(context.actor);
  return inTransaction(context, async (locked) => {
    const candidate = await lockCandidate(locked, input.candidateId, decidesClaims(context.actor));
    if (!me || !candidate) return notFound();
    const before = await newestResult(locked.db, candidate.id);
    if (before && !nextResult(factsIn(before), 'mark').ok) return refuse('settled', 'The result is released: answers after the end are no longer decided on.');
    const decided = await locked.db
      .updateTable('claim')
      .set({ decision: input.decision, decided_by: me, decided_at: sql`app.now()`, reason: input.reason })
      .where('candidate_id', '=', candidate.id).where('question', '=', input.question).where('part', '=', input.part).where('sequence', '=', input.sequence)
      .where('decision', 'is', null)
      .executeTakeFirst();
    if (decided.numUpdatedRows === 0n) return refuse('decided', 'This answer was decided on already.');
    await record(locked, {
      kind: 'claim.decided', subject: 'candidate', subjectId: candidate.id, note: input.reason,
      data: { question: input.question, part: input.part, sequence: input.sequence, decision: input.decision },
    });
    // In the same transaction, so that no release slips in between.
    if (input.decision === 'taken') await markPaperIn(locked.db, candidate.id, new PaperTemplates(locked.db));
    return done(null);
  });
}

/** Withholds a result that is not released, or lifts that again, with the reason. Withholding decides nothing. */
export async function withholdResult(context: Context, input: WithholdInput): Promise<Result<null>> {
  return inTransaction(context, async (locked) => {
    const candidate = await lockCandidate(locked, input.candidateId, marksSitting(context.actor));
    const before = candidate && (await newestResult(locked.db, candidate.id));
    if (!candidate || !before) return notFound();
    const next = nextResult(factsIn(before), input.withheld ? 'withhold' : 'lift');
    if (!next.ok) return next;
    await storeResult(locked, candidate.id, before, { ...totalsIn(before), ...next.value }, input.reason);
    return done(null);
  });
}

type Step = { event: ResultEvent; relation: RawBuilder<boolean>; conditions: (facts: SittingFacts) => Condition[]; kind: string; stamp?: boolean };

/** Moves every result of a sitting that the event fits; the others stay. One condition that is open stops all. */
async function moveAll(context: Context, sittingId: string, step: Step): Promise<Result<{ moved: number }>> {
  if (!isId(sittingId)) return notFound();
  return inTransaction(context, async (locked) => {
    const sitting = await locked.db.selectFrom('sitting').select('id').where('sitting.id', '=', sittingId).where(step.relation).forUpdate().executeTakeFirst();
    if (!sitting) return notFound();
    const candidates = await locked.db.selectFrom('candidate').select('id').where('sitting_id', '=', sittingId).orderBy('id').forUpdate().execute();
    const facts = (await sittingFacts(locked.db, [sittingId])).get(sittingId);
    const open = facts && step.conditions(facts).filter((condition) => condition.open);
    if (!open || open.length > 0) return refuse('conditions-open', `${open?.[0]?.says ?? 'The sitting has no results'}.`);
    let moved = 0;
    for (const { id } of candidates) {
      const before = await newestResult(locked.db, id);
      if (!before) continue;
      const next = nextResult(factsIn(before), step.event);
      if (!next.ok) continue;
      await storeResult(locked, id, before, { ...totalsIn(before), ...next.value }, '');
      moved += 1;
    }
    if (moved === 0) return refuse('nothing-to-do', 'No result is in a state for this.');
    if (step.stamp) await locked.db.updateTable('sitting').set({ released_at: sql`coalesce(released_at, app.now())` }).where('id', '=', sittingId).execute();
    await record(locked, { kind: step.kind, subject: 'sitting', subjectId: sittingId, data: { results: moved } });
    return done({ moved });
  });
}

const withoutModeration = (facts: SittingFacts): Condition[] => releaseConditions(facts).filter((condition) => condition.code !== 'moderation');

/** States that an instructor has looked the marks of a sitting through. Nothing may be left to decide. */
export const moderateSitting = (context: Context, sittingId: string) =>
  moveAll(context, sittingId, { event: 'moderate', relation: marksSitting(context.actor), conditions: withoutModeration, kind: 'results.moderated' });

/** Releases a sitting's results: from now on each student sees the own marked paper, keys and solutions. */
export const releaseResults = (context: Context, sittingId: string) =>
  moveAll(context, sittingId, { event: 'release', relation: marksSitting(context.actor), conditions: releaseConditions, kind: 'results.released', stamp: true });

/** Seals a sitting's results: no mark changes any more. */
export const sealResults = (context: Context, sittingId: string) =>
  moveAll(context, sittingId, { event: 'seal', relation: keepsRecords(context.actor), conditions: sealConditions, kind: 'results.sealed' });
