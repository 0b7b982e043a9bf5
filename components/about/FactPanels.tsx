import { useMemo } from 'react';
import {
  angleWords,
  beamWords,
  bitsWords,
  projectionWords,
  rangeWords,
  restFrequencyWords,
  restWords,
  skyWords,
  spectralWords,
} from '@/components/about/cubeWords';
import { degreesPerPixel } from '@/components/cube/Readout';
import { brightness, coordinateDigits, degrees } from '@/components/cube/words';
import { DefinitionRows, type DefinitionRow } from '@/components/ui/DefinitionRows';
import { fileSize, moment } from '@/components/ui/format';
import { Panel } from '@/components/ui/Panel';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import type { Cube, CubeAxes } from '@/shared/contract/cubes';
import { plainNumber } from '@/shared/physics/quantity';
import { buildWcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

/** The cube's facts in two parts, so that a wide window can put them side by side. */
export function FactPanels({ cube, part }: { cube: Cube; part: 'axes' | 'rest' }) {
  return part === 'axes' ? (
    <>
      {cube.axes && <SkyPanel axes={cube.axes} />}
      {cube.axes && <SpectralPanel axes={cube.axes} />}
      <BrightnessPanel cube={cube} />
    </>
  ) : (
    <FilePanel cube={cube} />
  );
}

/** A row whose value may be prose, which wraps, unlike a number. */
const row = (name: string, value: string, prose = false): DefinitionRow => ({
  key: name,
  name: <Text style={{ flexShrink: 0 }}>{name}</Text>,
  value: prose ? <Text align="right">{value}</Text> : value,
});

function SkyPanel({ axes }: { axes: CubeAxes }) {
  const sky = useMemo(() => {
    try {
      const wcs = buildWcs(axes.wcs as unknown as WcsSpec);
      return {
        perPixel: degreesPerPixel(axes, wcs),
        at: wcs.pixelToGalactic((axes.nx - 1) / 2, (axes.ny - 1) / 2),
      };
    } catch {
      return null; // the channel maps say why these coordinates cannot be used
    }
  }, [axes]);
  return (
    <Panel title="Sky">
      <DefinitionRows
        rows={[
          row('Pixels', `${axes.nx} × ${axes.ny}`),
          ...(sky ? [row('A pixel', angleWords(sky.perPixel))] : []),
          ...(sky?.at ? [row('Middle', middleWords(sky.at, coordinateDigits(sky.perPixel)))] : []),
          row('Projection', projectionWords(axes.projection), true),
          row('Coordinates', skyWords(axes.frame), true),
          row('Beam', beamWords(axes.beam), axes.beam === null),
        ]}
      />
    </Panel>
  );
}

const middleWords = ({ l, b }: { l: number; b: number }, digits: number): string =>
  `l ${degrees(l, digits)}  b ${degrees(b, digits)}`;

function SpectralPanel({ axes: { channels, spectral } }: { axes: CubeAxes }) {
  const rising = spectral.velocities[0] <= spectral.velocities[1];
  return (
    <Panel title="Velocity">
      <DefinitionRows
        rows={[
          row('Channels', String(channels)),
          row('A channel', `${plainNumber(spectral.channelWidth)} km/s`),
          row('Range', rangeWords(spectral)),
          row('Order in the file', rising ? 'rising velocity' : 'falling velocity', true),
          row('Axis', spectralWords(spectral.type), true),
          row('Convention', spectral.convention ?? 'not said', true),
          row('At rest with', restWords(spectral.frame), true),
          row(
            'Rest frequency',
            restFrequencyWords(spectral.restFrequencyHz),
            spectral.restFrequencyHz === null,
          ),
        ]}
      />
    </Panel>
  );
}

function BrightnessPanel({ cube }: { cube: Cube }) {
  const { axes, statistics: s } = cube;
  if (!axes) return null;
  const shown = (value: number | null) =>
    value === null ? 'none' : `${brightness(value)}${axes.unit ? ` ${axes.unit}` : ''}`;
  const voxels = axes.nx * axes.ny * axes.channels;
  return (
    <Panel title="Brightness">
      <DefinitionRows
        rows={[
          row('Unit', axes.unit ?? 'not said', axes.unit === null),
          ...(s
            ? [
                row('Lowest', shown(s.minimum)),
                row('Highest', shown(s.maximum)),
                row('Noise', shown(s.rms)),
                row('Without a value', blanksWords(s.blanks, voxels)),
              ]
            : []),
          row('Numbers', bitsWords(axes.bitpix), true),
        ]}
      />
    </Panel>
  );
}

function blanksWords(blanks: number, voxels: number): string {
  if (blanks === 0) return 'none';
  const percent = (100 * blanks) / voxels;
  return `${blanks.toLocaleString('en-GB')} (${percent < 0.1 ? '< 0.1' : plainNumber(percent, 3)} %)`;
}

function FilePanel({ cube }: { cube: Cube }) {
  return (
    <Panel title="File">
      <DefinitionRows
        rows={[
          row('Name', cube.fileName, true),
          row('Size', fileSize(cube.sizeBytes)),
          row('Uploaded', [cube.createdBy?.name, moment(cube.createdAt)].filter(Boolean).join(', '), true),
          ...(cube.readyAt ? [row('Read', moment(cube.readyAt), true)] : []),
          {
            key: 'checksum',
            name: <Text style={{ flexShrink: 0 }}>Checksum</Text>,
            value: (
              <Text
                mono
                size="small"
                align="right"
                selectable
                style={{ overflowWrap: 'anywhere', maxWidth: space(72) } as object}
              >
                {`SHA-256 ${cube.checksum}`}
              </Text>
            ),
          },
        ]}
      />
    </Panel>
  );
}
