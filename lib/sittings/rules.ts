import { done, refuse, type Result } from '@/lib/result';
import type { SittingEvent, SittingFacts, SittingState } from './model';

const moves: Record<SittingEvent, Partial<Record<SittingState, SittingState>>> = {
  'open-check-in': { planned: 'check-in' },
  start: { 'check-in': 'running' },
  pause: { running: 'paused' },
  resume: { paused: 'running' },
  close: { running: 'closed', paused: 'closed' },
  reconcile: { closed: 'reconciled' },
  cancel: { planned: 'cancelled', 'check-in': 'cancelled' },
  abandon: { running: 'abandoned', paused: 'abandoned' },
};

const words: Record<SittingEvent, string> = {
  'open-check-in': 'Check-in can be opened only while the sitting is planned',
  start: 'A sitting can be started only while check-in is open',
  pause: 'Only a running sitting can be paused',
  resume: 'Only a paused sitting can be resumed',
  close: 'Only a running or paused sitting can be closed',
  reconcile: 'A sitting is reconciled once it is closed',
  cancel: 'A sitting can be cancelled only before it starts',
  abandon: 'Only a running or paused sitting can be abandoned',
};

/**
 * The next state of a sitting after `event` at `now` (database time), or why not.
 * Check-in opens from its stated time on, once every paper is drawn.
 */
export function nextSitting(facts: SittingFacts, event: SittingEvent, now: Date): Result<SittingState, 'wrong-state' | 'papers-missing' | 'too-early'> {
  const next = moves[event][facts.state];
  if (!next) return refuse('wrong-state', `${words[event]}; this one is ${facts.state}.`);
  if (event === 'open-check-in') {
    if (!facts.papersDrawn) return refuse('papers-missing', 'The papers are not drawn yet. Wait until they are, or ask the instructor to draw them.');
    if (now < facts.opensAt) return refuse('too-early', 'Check-in has a stated opening time, and it has not come yet.');
  }
  return done(next);
}
