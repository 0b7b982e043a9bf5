import { useSession } from '@/components/cube/session';
import { frameWords } from '@/components/cube/words';
import { LayerSection } from '@/components/seeing/LayerSection';
import { ContourSection } from '@/components/seeing/ContourSection';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';

/** Lines of coordinates and how angles are written; contours of another map. */
export function LinesSection() {
  const { coordinates, axes } = useSession();
  const { grid, notation, setGrid, setNotation } = coordinates;
  const own = frameWords(axes.frame === 'galactic' ? 'icrs' : axes.frame);
  return (
    <>
      <SegmentedChoice
        label="Lines of coordinates"
        value={grid}
        options={[
          { value: 'galactic', label: 'l, b' },
          { value: 'equatorial', label: `${own.lon}, ${own.lat}` },
          { value: 'off', label: 'none' },
        ]}
        onChange={setGrid}
      />
      <SegmentedChoice
        label="Angles"
        value={notation}
        options={[
          { value: 'decimal', label: 'Degrees' },
          { value: 'sexagesimal', label: 'Sexagesimal' },
        ]}
        onChange={setNotation}
      />
      <LayerSection />
      <ContourSection />
    </>
  );
}
