import { OutcomeMark, ResultMark } from '@/components/results/OutcomeMark';
import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { LedgerColumn, LedgerRow } from '@/components/ui/ledger/model';
import { Sign } from '@/components/ui/Sign';
import type { MarkedCandidate } from '@/lib/results/marking-queries';

const columns = (decimals: number): LedgerColumn[] => [
  { key: 'name', title: 'Candidate' },
  { key: 'number', title: 'Number' },
  { key: 'total', title: 'Total', figures: decimals, rule: true },
  { key: 'percent', title: 'Percent', figures: decimals },
  { key: 'outcome', title: 'Outcome', rule: true, choose: true },
  { key: 'state', title: 'Result' },
  { key: 'look', title: 'To look at', choose: true },
];

const looks = (candidate: MarkedCandidate): string =>
  [
    candidate.forMarker > 0 ? `${candidate.forMarker} for the marker` : '', candidate.unread > 0 ? `${candidate.unread} not read` : '',
    candidate.overridden > 0 ? `${candidate.overridden} decided` : '',
  ].filter(Boolean).join(', ');

function rowOf(candidate: MarkedCandidate, sittingId: string): LedgerRow {
  const { result } = candidate;
  const absent = result?.outcome === 'absent';
  const look = looks(candidate);
  const waits = candidate.forMarker + candidate.unread > 0;
  return {
    id: candidate.id, gone: absent, href: `/marking/${sittingId}/${candidate.id}`,
    cells: {
      name: candidate.name, number: { value: candidate.learnerNumber, show: <span className="num whitespace-nowrap text-13">{candidate.learnerNumber}</span> },
      total: result && !absent ? result.total : null, percent: result && !absent ? result.percent : null,
      outcome: result ? { value: result.withheld ? 'withheld' : result.outcome, show: <OutcomeMark outcome={result.outcome} withheld={result.withheld} small /> } : 'not marked',
      state: result ? { value: result.state, show: <ResultMark state={result.state} withheld={result.withheld} small /> } : null,
      look: look === '' ? null : { value: look, show: <Sign shape={waits ? 'sq-bang' : 'check'} tone={waits ? 'wait' : 'ok'} small>{look}</Sign> },
    },
  };
}

/** Candidates with their totals and what somebody should look at. */
export function CandidatesLedger({ sittingId, candidates, decimals }: { sittingId: string; candidates: readonly MarkedCandidate[]; decimals: number }) {
  return (
    <Ledger
      label="Candidates" columns={columns(decimals)} rows={candidates.map((candidate) => rowOf(candidate, sittingId))}
      empty={<EmptyState title="No candidate" says="Nobody was on the list of this sitting." />}
      options={{ noun: { one: 'candidate', many: 'candidates' }, find: 'Find a name or number', file: 'marking-candidates' }}
    />
  );
}
