import { useMemo } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { SliceChoice } from '@/components/seeing/SliceChoice';
import { NumberSlider } from '@/components/seeing/NumberSlider';
import { CutPlot } from '@/components/slices/CutPlot';
import type { Slice } from '@/components/slices/slice';
import { SpectrumPlot } from '@/components/slices/SpectrumPlot';
import { IconButton } from '@/components/ui/Button';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { useSpectrum } from '@/hooks/useCubes';
import { useCut } from '@/hooks/useCut';
import { separation } from '@/shared/sky/greatCircle';

/** Position–velocity slices and spectra: what is cut, and the cut. Loaded when first opened. */
export default function SlicePanel({ height, closable }: { height: number; closable?: boolean }) {
  const { seeing } = useSession();
  const { slice, change } = seeing;
  return (
    <View role="region" aria-label="Slices through velocity" style={{ gap: space(2) }}>
      <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(2), flexWrap: 'wrap' }}>
        <SliceChoice hideLabel />
        {slice && (
          <Text size="small" tone="quiet" style={{ flexShrink: 1 }}>
            Drag its handles on the map.
          </Text>
        )}
        {closable && (
          <View style={{ marginLeft: 'auto' }}>
            <IconButton icon="close" label="Close the slices" onPress={() => change({ slice: null })} />
          </View>
        )}
      </View>
      {!slice && (
        <Text tone="quiet">
          Cut the cube along a segment or around a ring to see position against velocity, or take the spectrum
          of a place. Close to a shell’s rim a slice shows its near and far sides as two lines that meet.
        </Text>
      )}
      {slice && slice.kind !== 'spectrum' && <CutView slice={slice} height={height} />}
      {slice?.kind === 'spectrum' && <SpectrumView slice={slice} height={height} />}
    </View>
  );
}

function CutView({ slice, height }: { slice: Exclude<Slice, { kind: 'spectrum' }>; height: number }) {
  const { cube } = useSession();
  const number = (value: number) => value.toFixed(6);
  const query =
    slice.kind === 'segment'
      ? `l=${number(slice.l)}&b=${number(slice.b)}&toL=${number(slice.toL)}&toB=${number(slice.toB)}`
      : `l=${number(slice.l)}&b=${number(slice.b)}&radius=${number(slice.radius)}`;
  const { cut, problem, retry } = useCut(cube, query);
  return (
    <>
      <CutPlot slice={slice} cut={cut} height={height} />
      {problem && <ProblemNotice problem={problem} onRetry={retry} />}
    </>
  );
}

function SpectrumView({ slice, height }: { slice: Extract<Slice, { kind: 'spectrum' }>; height: number }) {
  const { cube, wcs, axes, seeing } = useSession();
  const { change } = seeing;
  const at = useMemo(() => wcs.galacticToPixel(slice.l, slice.b), [wcs, slice.l, slice.b]);
  const pixel = useMemo(() => pixelDegrees(wcs, at), [wcs, at]);
  const inside = at && at.x > -0.5 && at.y > -0.5 && at.x < axes.nx - 0.5 && at.y < axes.ny - 0.5;
  const query = inside
    ? `x=${at.x.toFixed(1)}&y=${at.y.toFixed(1)}&radius=${(slice.radius / pixel).toFixed(1)}&inner=${(slice.inner / pixel).toFixed(1)}`
    : '';
  const { data, problem, reload } = useSpectrum(inside ? cube.id : null, query);
  const most = (Math.min(axes.nx, axes.ny) / 4) * pixel;
  return (
    <>
      <SpectrumPlot spectrum={inside ? (data ?? null) : null} height={height} />
      {!inside && <Text tone="quiet">This place lies outside the cube.</Text>}
      {problem && <ProblemNotice problem={problem} onRetry={() => void reload()} />}
      <View style={{ flexDirection: 'row', gap: space(4) }}>
        <View style={{ flex: 1 }}>
          <NumberSlider
            label="Radius of the disc"
            value={slice.radius}
            low={0}
            high={most}
            step={pixel / 2}
            words={slice.radius === 0 ? 'a point' : `${(slice.radius * 60).toFixed(1)}′`}
            onChange={(radius) =>
              change({ slice: { ...slice, radius, inner: Math.min(slice.inner, radius * 0.95) } })
            }
          />
        </View>
        <View style={{ flex: 1 }}>
          <NumberSlider
            label="Inner edge"
            value={slice.inner}
            low={0}
            high={slice.radius * 0.95}
            step={pixel / 2}
            words={slice.inner === 0 ? 'none: a disc' : `${(slice.inner * 60).toFixed(1)}′`}
            onChange={(inner) => change({ slice: { ...slice, inner: Math.min(inner, slice.radius * 0.95) } })}
          />
        </View>
      </View>
    </>
  );
}

/** Degrees of a pixel at a place: the spectrum is asked for in pixels. */
function pixelDegrees(
  wcs: { pixelToSky(x: number, y: number): { lon: number; lat: number } | null },
  at: { x: number; y: number } | null,
): number {
  const here = at && wcs.pixelToSky(at.x, at.y);
  const beside = at && wcs.pixelToSky(at.x, at.y + 1);
  return here && beside ? separation(here, beside) : 0.01;
}
