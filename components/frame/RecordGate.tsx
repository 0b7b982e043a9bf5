import type { Href } from 'expo-router';
import type { ReactNode } from 'react';
import type { Read } from '@/hooks/useRead';
import { Button } from '../ui/Button';
import { EmptyState } from '../ui/EmptyState';
import { ProblemNotice } from '../ui/ProblemNotice';
import { SkeletonRows } from '../ui/Skeleton';

/** Waiting, gone, failed, or the record: the four states of everything that is read, in one place. */
export function RecordGate<T>({
  read,
  what,
  home,
  children,
  skeleton,
}: {
  read: Read<T>;
  /** 'this region'; for the sentence that says it is not there. */
  what: string;
  home?: { href: Href; label: string };
  children: (data: T) => ReactNode;
  skeleton?: ReactNode;
}) {
  if (read.data !== undefined) return <>{children(read.data)}</>;
  if (read.problem?.status === 404)
    return (
      <EmptyState
        icon="search"
        title={`There is no ${what} here`}
        action={home && <Button label={home.label} href={home.href} kind="primary" />}
      >
        It may have been taken out, or the link may be from another team.
      </EmptyState>
    );
  if (read.problem) return <ProblemNotice problem={read.problem} onRetry={() => void read.reload()} />;
  return <>{skeleton ?? <SkeletonRows rows={4} />}</>;
}
