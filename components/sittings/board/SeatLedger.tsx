'use client';

import { StateMark } from '@/components/ui/StateMark';
import { leftText, progressOf, signalOf } from './look';
import type { SeatsProps } from './SeatPlan';

/** The same seats as rows, for a long room. */
export function SeatLedger({ seats, board, now, time, selected, onSelect }: SeatsProps) {
  return (
    <div className="ledger-scroll" role="region" aria-label="Candidates as rows" tabIndex={0}>
      <table className="ledger">
        <thead>
          <tr>
            <th scope="col">Seat</th><th scope="col">Candidate</th><th scope="col">State</th><th scope="col">Wants a look</th>
            <th scope="col" className="n dbl">Answered</th><th scope="col" className="n">Last heard</th><th scope="col" className="n">Time left</th>
          </tr>
        </thead>
        <tbody>
          {seats.map((seat) => {
            const signal = signalOf(seat, now);
            const progress = progressOf(seat, board);
            return (
              <tr key={seat.candidateId} className={seat.candidateId === selected ? 'is-selected' : undefined}>
                <td className="mono">{seat.seat || '–'}</td>
                <td><button type="button" className="btn btn--quiet name" aria-pressed={seat.candidateId === selected} onClick={() => onSelect(seat.candidateId)}>{seat.name}</button>{seat.need && <span className="need">{seat.need}</span>}</td>
                <td><StateMark thing="candidate" state={seat.state} small /></td>
                <td>{signal ? <StateMark thing="signal" state={signal} small /> : ''}</td>
                <td className="n dbl">{progress.answered} of {progress.of}</td>
                <td className="n">{seat.heardAt === null ? '–' : `${Math.max(0, Math.round((now - seat.heardAt) / 1000))} s`}</td>
                <td className="n">{leftText(seat, now, time)}</td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}
