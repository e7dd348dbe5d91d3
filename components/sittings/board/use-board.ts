'use client';

import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { BoardSnapshot } from '@/lib/sittings/board-model';
import { boardKey, boardStream, fetchBoard } from '@/lib/sittings/client';

/**
 * The board as it changes: the stream while it lives, asking each few seconds while it does not. `now` is the server's time,
 * going on between snapshots by the browser's monotonic clock.
 */
export function useBoard(first: BoardSnapshot): { board: BoardSnapshot; now: number; live: boolean | null } {
  const id = first.sitting.id;
  const client = useQueryClient();
  // Null until the stream opened or failed for the first time: nothing is wrong yet.
  const [live, setLive] = useState<boolean | null>(null);
  const { data: board } = useQuery({
    queryKey: boardKey(id), queryFn: () => fetchBoard(id), initialData: first, staleTime: Infinity, refetchInterval: live ? false : 4_000,
  });
  useEffect(() => {
    let stream: EventSource;
    let again: ReturnType<typeof setTimeout> | undefined;
    const open = () => {
      stream = new EventSource(boardStream(id));
      stream.addEventListener('board', (event) => {
        const next = JSON.parse((event as MessageEvent<string>).data) as BoardSnapshot;
        client.setQueryData<BoardSnapshot>(boardKey(id), (before) => (before && before.now > next.now ? before : next));
      });
      stream.onopen = () => setLive(true);
      stream.onerror = () => {
        setLive(false);
        if (stream.readyState === EventSource.CLOSED) again = setTimeout(open, 5_000);
      };
    };
    open();
    return () => {
      stream.close();
      clearTimeout(again);
    };
  }, [client, id]);
  return { board, now: useTimeSince(board), live };
}

function useTimeSince(board: BoardSnapshot): number {
  const [told, setTold] = useState({ board, now: board.now });
  useEffect(() => {
    const since = performance.now();
    const tick = setInterval(() => setTold({ board, now: board.now + performance.now() - since }), 500);
    return () => clearInterval(tick);
  }, [board]);
  return told.board === board ? told.now : board.now;
}
