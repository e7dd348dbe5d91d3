import { SheetSkeleton } from '@/components/ui/Skeleton';

export default function Loading() {
  return <SheetSkeleton />;
}
