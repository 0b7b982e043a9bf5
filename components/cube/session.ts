import { createContext, useContext } from 'react';
import type { CubeSession } from '@/components/cube/cubeSession';

export const SessionContext = createContext<CubeSession | null>(null);

/** The cube screen's state, for its parts. */
export function useSession(): CubeSession {
  const session = useContext(SessionContext);
  if (!session) throw new Error('This part belongs on the cube screen.');
  return session;
}
