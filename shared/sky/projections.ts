import { car, cea, mer } from './projections/cylindrical';
import { ncp, sin } from './projections/orthographic';
import type { ProjectionMaker } from './projections/projection';
import { ait, mol, sfl } from './projections/pseudocylindrical';
import { arc, stg, tan, zea } from './projections/zenithal';

/** The projections that can be read, by the code in CTYPE. A new one is added here and is then tested with the rest. */
export const PROJECTIONS: Record<string, ProjectionMaker> = {
  TAN: tan,
  SIN: sin,
  NCP: ncp,
  ARC: arc,
  STG: stg,
  ZEA: zea,
  CAR: car,
  CEA: cea,
  MER: mer,
  SFL: sfl,
  GLS: sfl,
  AIT: ait,
  MOL: mol,
};
