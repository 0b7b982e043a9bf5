import { cubeCommands, type CommandView } from '@/components/cube/cubeCommands';
import type { CubeSession } from '@/components/cube/cubeSession';
import { seeingCommands, useFlickRelease } from '@/components/seeing/seeingCommands';
import { useCommands } from '@/components/ui/commands/CommandsProvider';

/** Makes the cube screen's keys live. */
export function useCubeCommands(session: CubeSession, view: CommandView): void {
  useCommands([...cubeCommands(session, view), ...seeingCommands(session)]);
  useFlickRelease(session);
}
