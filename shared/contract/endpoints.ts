/**
 * Every route of /api/v1 with its contract: the OpenAPI document is generated from this table, and a test holds the
 * server's routes to it, so that neither lists what the other lacks.
 */
import type { Endpoint } from './endpoint';
import { CUBE_ENDPOINTS } from './endpointsCubes';
import { IMAGE_ENDPOINTS } from './endpointsImages';
import { SHELL_ENDPOINTS } from './endpointsShells';
import { TEAM_ENDPOINTS } from './endpointsTeam';

export type { Endpoint };

export const ENDPOINTS: readonly Endpoint[] = [
  ...TEAM_ENDPOINTS,
  ...CUBE_ENDPOINTS,
  ...IMAGE_ENDPOINTS,
  ...SHELL_ENDPOINTS,
];
