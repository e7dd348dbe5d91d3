import { LedgerSkeleton } from '@/components/ui/Skeleton';

export default function Loading() {
  return <LedgerSkeleton />;
}
