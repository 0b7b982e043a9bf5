import type { ModelName } from '@/shared/contract/fits';
import type { RegionDraft } from '@/shared/contract/regions';
import type { DistanceDraft } from '@/shared/contract/shells';
import type { MarkingStyle } from '@/shared/synthetic/marksOf';
import type { CubeRecipe } from '@/shared/synthetic/recipe';
import { BROAD_MAP, SMALL_MAP } from './farMeadow';
import { NEAR_FIELD, WIDE_FIELD } from './quietReach';

/** What the demo makes of one shell of a recipe. */
export interface PlannedShell {
  /** Also the name in the recipe. */
  name: string;
  note?: string;
  /** Who marks it, and how; one reading each. */
  readings: { by: 'ansa' | 'bram'; style: MarkingStyle }[];
  /** Whose reading is fitted, and whether the fit is adopted; none: the marks wait. */
  fit?: { of: 'ansa' | 'bram'; adopt: boolean };
  /** Other models fitted to the same reading, and whether the rim is traced around the first fit and fitted too. */
  compare?: { models?: ModelName[]; traced?: boolean };
  distance?: DistanceDraft;
}

export interface PlannedCube {
  fileName: string;
  recipe: CubeRecipe;
  shells: PlannedShell[];
}

export interface PlannedRegion {
  draft: RegionDraft;
  cubes: PlannedCube[];
}

/** Who sends the cubes. */
export const UPLOADER = 'bram';

export const PLAN: PlannedRegion[] = [
  {
    draft: {
      name: 'Quiet Reach',
      description: 'A ring that opens to the south, the smaller one beside it, and the wide arc below them.',
      centre: { l: 216, b: -12 },
      distance: { pc: 1250, errorPc: 140 },
    },
    cubes: [
      {
        fileName: 'QR-1.fits',
        recipe: NEAR_FIELD,
        shells: [
          {
            name: 'Harrow ring',
            note: 'The rim is missing to the south-south-west on every channel; both caps can be followed.',
            readings: [
              { by: 'bram', style: { seed: 101, channels: 9, perChannel: 8 } },
              { by: 'ansa', style: { seed: 102, channels: 7, perChannel: 10, span: [-0.8, 0.8] } },
            ],
            fit: { of: 'bram', adopt: true },
            compare: { models: ['drifting'] },
          },
          {
            name: 'Twin east',
            readings: [{ by: 'bram', style: { seed: 103, channels: 7, perChannel: 8 } }],
            fit: { of: 'bram', adopt: true },
          },
        ],
      },
      {
        fileName: 'QR-2.fits',
        recipe: WIDE_FIELD,
        shells: [
          {
            name: 'Low arc',
            note: 'Less than half of the rim is seen. The north-east has nothing to mark.',
            readings: [{ by: 'bram', style: { seed: 104, channels: 9, perChannel: 10 } }],
            fit: { of: 'bram', adopt: true },
          },
          {
            name: 'Brim',
            readings: [{ by: 'ansa', style: { seed: 105, channels: 8, perChannel: 9 } }],
            fit: { of: 'ansa', adopt: true },
          },
        ],
      },
    ],
  },
  {
    draft: {
      name: 'Far Meadow',
      description: 'High above the plane. No distance for the whole of it: they are entered shell by shell.',
      centre: { l: 153.4, b: 26 },
      distance: null,
    },
    cubes: [
      {
        fileName: 'FM-1.fits',
        recipe: SMALL_MAP,
        shells: [
          {
            name: 'Ketch',
            readings: [{ by: 'bram', style: { seed: 106, channels: 9, perChannel: 10 } }],
            fit: { of: 'bram', adopt: true },
            compare: { traced: true },
            distance: {
              pc: 2900,
              errorPc: 450,
              method: 'absorption towards stars before and behind the rim',
              note: 'Four stars; the rim lies between the third and the fourth.',
            },
          },
          {
            name: 'Little bell',
            note: 'Marked, not yet fitted.',
            readings: [{ by: 'bram', style: { seed: 107, channels: 6, perChannel: 7 } }],
          },
        ],
      },
      {
        fileName: 'FM-2.fits',
        recipe: BROAD_MAP,
        shells: [
          {
            name: 'Sallow gate',
            note: 'Marked on the near side alone. Not to be adopted before the far side is.',
            readings: [{ by: 'ansa', style: { seed: 108, channels: 8, perChannel: 8, span: [-0.85, 0.2] } }],
            fit: { of: 'ansa', adopt: false },
          },
          {
            name: 'Thin place',
            note: 'A few marks on two channels so far.',
            readings: [{ by: 'bram', style: { seed: 109, channels: 2, perChannel: 3, span: [-0.3, 0.3] } }],
          },
        ],
      },
    ],
  },
];
