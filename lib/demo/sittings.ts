import { readClock } from '@/db/clock';
import { addTime, admit, noteIncident } from '@/lib/candidates/commands';
import { saveResponses } from '@/lib/candidates/save';
import { declare, handIn, takeSeat } from '@/lib/candidates/seat-commands';
import type { Seat } from '@/lib/candidates/seat-token';
import { planSitting } from '@/lib/planning/commands';
import { inviteCandidates } from '@/lib/planning/invite';
import { drawPapers } from '@/lib/planning/jobs';
import { toLocal } from '@/lib/school/times';
import { closeSitting, openCheckIn, reconcileSitting, recordEnds, startSitting } from '@/lib/sittings/commands';
import type { Draw } from '@/lib/templates/draw';
import { school } from './cast';
import type { Company } from './people';
import { type Hand, hands, simulate } from './simulate';
import { must, type Player, setMinutes, type Stage } from './stage';

type Occasion = { formId: string; className: string; title: string; room: string; proctors: Player[]; startsIn: number; latest?: number };
const minute = 60_000;

/** Plans a sitting that starts so many minutes from now on the demo's clock, draws its papers and invites. */
export async function plan({ db, say }: Stage, company: Company, occasion: Occasion): Promise<string> {
  const cls = company.classes.get(occasion.className);
  if (!cls) throw new Error(`Demo: no class ${occasion.className}.`);
  const now = (await readClock(db)).getTime();
  const at = (minutes: number) => toLocal(new Date(now + minutes * minute), { zone: school.zone, locale: 'en-CA' });
  const { sittingId } = must(await planSitting(company.author, {
    formId: occasion.formId, classId: cls.id, title: occasion.title, room: occasion.room, proctors: occasion.proctors.map((proctor) => proctor.id),
    opensAt: at(occasion.startsIn - 30), startsAt: at(occasion.startsIn), latestStartAt: at(occasion.startsIn + (occasion.latest ?? 30)),
  }), occasion.title);
  const { drawn } = must(await drawPapers(db, { sittingId }), `papers of ${occasion.title}`);
  must(await inviteCandidates(company.author, sittingId), `invitations to ${occasion.title}`);
  say(`  ${occasion.title}, ${occasion.className}: ${drawn} papers drawn`);
  return sittingId;
}

type Sitter = { seat: Seat; player: Player; hand: Hand; draws: { question: number; draw: Draw }[] };

async function seatEverybody({ db }: Stage, company: Company, sittingId: string, absent: ReadonlySet<string>): Promise<Sitter[]> {
  const players = new Map([...company.classes.values()].flatMap((cls) => cls.learners).map((learner) => [learner.id, learner]));
  const rows = await db.selectFrom('candidate').select(['id', 'account_id']).where('sitting_id', '=', sittingId).orderBy('seat').execute();
  const present = rows.filter((row) => !absent.has(players.get(row.account_id)?.learner.name ?? ''));
  must(await admit(company.proctor, sittingId, present.map((row) => row.id)), 'admitting');
  const sitters: Sitter[] = [];
  for (const [place, row] of present.entries()) {
    const player = players.get(row.account_id);
    const hand = hands[(place * 2) % hands.length];
    if (!player || !hand) continue;
    const seat = must(await takeSeat(player, sittingId, `demo-device-${place}-0123456789`), 'taking a seat');
    if (!seat) throw new Error('Demo: an admitted candidate found no seat.');
    must(await declare(player, seat), 'declaring');
    const keys = await db.selectFrom('paper_key').select(['question', 'draw']).where('candidate_id', '=', row.id).orderBy('question').execute();
    sitters.push({ seat, player, hand, draws: keys.map((key) => ({ question: key.question, draw: key.draw as unknown as Draw })) });
  }
  return sitters;
}

/** One question of one candidate: typed, sometimes corrected, saved as the room saves. */
async function answer({ db }: Stage, { seat, hand, draws }: Sitter, place: number, sequence: { last: number }): Promise<void> {
  const asked = draws[place];
  if (!asked) return;
  const revisions = simulate(asked.draw, hand, seat.candidateId).filter((one) => one.answer !== '').map((one) => ({
    question: asked.question, part: one.part, sequence: (sequence.last += 1), answer: one.answer, typedAt: 0,
  }));
  if (revisions.length === 0) return;
  const saved = await saveResponses(db, seat, revisions);
  if (!saved.ok) throw new Error(`Demo: a save was refused (${saved.code}).`);
}

/**
 * A whole sitting that is over: check-in, a late candidate, more time with a reason, an incident, an absence; most hand in,
 * one runs out of time. Runs on the demo's clock, which stands `startedAgo` minutes before the true time at the start.
 */
export async function sit(stage: Stage, company: Company, sittingId: string, startedAgo: number, absent: readonly string[]): Promise<void> {
  const { db } = stage;
  const clock = (after: number) => setMinutes(db, after - startedAgo);
  const { proctor } = company;
  await clock(-20);
  must(await openCheckIn(proctor, sittingId), 'opening check-in');
  const sitters = await seatEverybody(stage, company, sittingId, new Set(absent));
  await clock(0);
  must(await startSitting(proctor, sittingId), 'starting');
  const sequences = sitters.map(() => ({ last: 0 }));
  const questions = Math.max(...sitters.map((sitter) => sitter.draws.length));
  for (let place = 0; place < questions; place += 1) {
    await clock(5 + place * 9);
    for (const [index, sitter] of sitters.entries()) await answer(stage, sitter, place, sequences[index] ?? { last: 0 });
    if (place === 2) must(await addTime(proctor, sittingId, [sitters[1]?.seat.candidateId ?? ''], 5, 'Tablet restarted, five minutes lost.'), 'more time');
    if (place === 3) must(await noteIncident(proctor, sittingId, null, 'Noise from the yard for about ten minutes; windows shut.'), 'an incident');
  }
  await clock(5 + questions * 9);
  for (const sitter of sitters.slice(0, -1)) must(await handIn(sitter.player, sitter.seat), 'handing in');
  await clock(125);
  await recordEnds({ db, actor: { kind: 'system', name: 'worker' } });
  must(await closeSitting(proctor, sittingId), 'closing');
  must(await reconcileSitting(proctor, sittingId), 'signing');
}

