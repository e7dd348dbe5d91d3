import Link from 'next/link';
import { EmptyState } from '@/components/ui/EmptyState';
import { Sign } from '@/components/ui/Sign';
import { StateMark } from '@/components/ui/StateMark';
import type { OwnResult } from '@/lib/results/paper-queries';

export type OwnLine = OwnResult & { sat: string; says: string };

/** A student's sittings that are over; those whose results are released lead to the marked paper. */
export function OwnResults({ results }: { results: readonly OwnLine[] }) {
  return (
    <div className="today">
      <h1>My results</h1>
      {results.length === 0 ? <EmptyState title="No result yet" says="A sitting stands here once it is over. Its result follows when your instructor releases it." /> : (
        <ul className="rows">
          {results.map((result) => (
            <li key={result.candidateId}>
              <div>
                <span>
                  {result.open ? <Link href={`/results/${result.candidateId}`}><b>{result.title}</b></Link> : <b>{result.title}</b>}
                  <small>Sat {result.sat}{result.says && ` · ${result.says}`}</small>
                </span>
                {result.outcome ? <StateMark thing="outcome" state={result.outcome} /> : <Sign shape="sq-dashed" tone="none">not released yet</Sign>}
              </div>
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}
