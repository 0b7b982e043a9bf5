import { lazy, Suspense } from 'react';
import { Skeleton } from '@/components/ui/Skeleton';

const SlicePanel = lazy(() => import('@/components/slices/SlicePanel'));

/** The slices' panel; its code comes when it is first shown. */
export function Slices({ height, closable }: { height: number; closable?: boolean }) {
  return (
    <Suspense fallback={<Skeleton height={height + 52} />}>
      <SlicePanel height={height} closable={closable} />
    </Suspense>
  );
}
