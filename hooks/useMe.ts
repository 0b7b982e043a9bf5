import { useEffect } from 'react';
import { useSWRConfig } from 'swr';
import { may, type Action } from '@/shared/contract/permissions';
import type { Me } from '@/shared/contract/people';
import { api, onSignedOut, setCsrfToken } from './api';
import { keys } from './keys';
import { useRead, type Read } from './useRead';

/** The person who is signed in; `problem.status` is 401 where nobody is. */
export function useMe(): Read<Me> & { signedOut: boolean } {
  const read = useRead<Me>(keys.me(), { revalidateOnFocus: false });
  const token = read.data?.csrfToken ?? null;
  // before the first write of this render's children can leave
  if (read.data) setCsrfToken(token);
  return { ...read, signedOut: read.problem?.status === 401 };
}

/** Whether this person's role allows an action; screens hide by it, services refuse by the same table. */
export function useMay(): (action: Action) => boolean {
  const { data } = useMe();
  return (action) => may(data?.role, action);
}

/** Forgets the session in the cache as soon as the server says that it does not know it. */
export function useSessionWatch() {
  const { mutate } = useSWRConfig();
  useEffect(() => onSignedOut(() => void mutate(keys.me())), [mutate]);
}

/** Ends the session and leaves for the sign-in page with nothing kept in memory. */
export async function signOut(): Promise<void> {
  await api('/auth/sign-out', { method: 'POST' });
  globalThis.location.assign('/sign-in');
}

export interface Provider {
  name: string;
  /** The stand-in for development, not the hosted service. */
  local: boolean;
}
export const useProvider = () => useRead<Provider>(keys.provider());
