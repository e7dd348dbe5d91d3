'use client';

import { useQuery } from '@tanstack/react-query';
import { useRouter } from 'next/navigation';
import { useEffect } from 'react';
import { Progress } from '@/components/ui/Progress';
import { fetchPapers, planKeys } from '@/lib/planning/client';

/** Papers as they are being drawn; when that ends, the page is read again. It goes on when the page is left. */
export function PapersProgress({ sittingId, drawn, of }: { sittingId: string; drawn: number; of: number }) {
  const router = useRouter();
  const { data } = useQuery({
    queryKey: planKeys.papers(sittingId), queryFn: ({ signal }) => fetchPapers(sittingId, signal),
    refetchInterval: (query) => (query.state.data && query.state.data.papers !== 'drawing' ? false : 1_000),
  });
  const over = data !== undefined && data.papers !== 'drawing';
  useEffect(() => {
    if (over) router.refresh();
  }, [over, router]);
  return <Progress label="Drawing papers" done={data?.drawn ?? drawn} of={data?.of ?? of} unit="papers" says="Each is drawn once and stored whole. You may leave this page." />;
}
