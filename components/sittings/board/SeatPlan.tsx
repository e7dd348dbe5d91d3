'use client';

import { Seat } from '@/components/ui/Seat';
import type { BoardSeat, BoardSnapshot } from '@/lib/sittings/board-model';
import { leftText, progressOf, signalOf } from './look';

export type SeatsProps = { seats: readonly BoardSeat[]; board: BoardSnapshot; now: number; time: (at: number) => string; selected: string | null; onSelect: (candidateId: string) => void };

/** The room's seats in their order, the front at the top. A seat never moves while its state changes. */
export function SeatPlan({ seats, board, now, time, selected, onSelect }: SeatsProps) {
  return (
    <section aria-label="Seats">
      <div className="front cap">Front of the room</div>
      <div className="seats">
        {seats.map((seat) => (
          <Seat
            key={seat.candidateId}
            person={{ seat: seat.seat || '–', name: seat.name, ...(seat.need ? { need: seat.need } : {}) }}
            state={seat.state}
            signal={signalOf(seat, now)}
            progress={progressOf(seat, board)}
            left={leftText(seat, now, time)}
            select={{ selected: seat.candidateId === selected, onSelect: () => onSelect(seat.candidateId) }}
          />
        ))}
      </div>
    </section>
  );
}
