import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { ExamRoom } from '@/components/candidates/ExamRoom';
import { isId } from '@/lib/ids';

export const metadata: Metadata = { title: 'Exam room' };

/** A shell without anybody's data in it, so that the service worker may keep it: all else comes through the room's handlers. */
export default async function SitPage({ params }: { params: Promise<{ sittingId: string }> }) {
  const { sittingId } = await params;
  if (!isId(sittingId)) notFound();
  return <ExamRoom sittingId={sittingId} />;
}
