import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { QueryProvider } from '@/components/shell/QueryProvider';
import { Board } from '@/components/sittings/board/Board';
import { pageContext } from '@/lib/auth/context';
import { readBoard } from '@/lib/sittings/board-queries';
import { actOnBoard } from './actions';

type Params = { params: Promise<{ sittingId: string }> };

export async function generateMetadata({ params }: Params): Promise<Metadata> {
  const board = await readBoard(await pageContext('proctor', 'instructor', 'registrar'), (await params).sittingId);
  return { title: board.ok ? `Board, ${board.value.sitting.title}` : 'Board' };
}

/** The proctor's board of one sitting; instructors of the class and registrars may look at it. */
export default async function BoardPage({ params }: Params) {
  const { sittingId } = await params;
  const board = await readBoard(await pageContext('proctor', 'instructor', 'registrar'), sittingId);
  if (!board.ok) notFound();
  return (
    <QueryProvider>
      <Board first={board.value} act={actOnBoard.bind(null, sittingId)} />
    </QueryProvider>
  );
}
