import type { CubeSession } from '@/components/cube/cubeSession';
import { VIEWS } from '@/components/cube/views';
import { frameWords, windowWords } from '@/components/cube/words';
import { captionWords } from '@/components/figure/captionWords';
import { velocityOf } from '@/components/figure/channelPanel';
import type { Choices } from '@/components/figure/choices';
import { FAMILY } from '@/components/figure/face';
import { skyMapping } from '@/components/seeing/skyMapping';
import { themes } from '@/components/ui/tokens';
import type { Figure, FigureColours, FigurePanel, Section } from '@/shared/image/figure/figure';
import { colourBar } from '@/shared/image/figure/colourBar';
import { sectionOf, wholeImage } from '@/shared/image/figure/figureLayout';
import { graticule } from '@/shared/image/graticule';
import type { Look } from '@/shared/image/tone';

/** White paper or the dark ground; pictures are dark on both. */
const coloursOf = (ground: Choices['ground']): FigureColours => {
  const c = themes[ground];
  return {
    ground: ground === 'paper' ? c.raised : c.ground,
    text: c.text,
    quiet: c.quiet,
    image: c.image,
    onImage: c.onImage,
    person: c.personOnImage,
    model: c.modelOnImage,
  };
};

/** The part of the picture that a figure shows. */
export function sectionFor(s: CubeSession, part: Choices['part']): Section {
  const v = s.store.viewport.get();
  return (part === 'seen' && v && sectionOf(v)) || wholeImage(s.seen);
}

/** The panel of what is on the map now, all but its raster. */
export function seenPanel(s: CubeSession): FigurePanel {
  const { scene, view, stated } = s;
  const label = view === 'channel' ? velocityOf(s, s.channel) : VIEWS[view].label;
  return {
    raster: null,
    label: stated.length > 0 ? `${label} · ${stated[0]}${stated.length > 1 ? ' …' : ''}` : label,
    marks: scene.marks.map((m) => ({
      x: m.x,
      y: m.y,
      ...(m.unsure && { unsure: true }),
      ...(m.away !== 0 && { faint: true }),
    })),
    modelRing: scene.modelRing,
    ownRing: scene.ownRing,
    centre: scene.centre,
    contours: scene.contours,
    layers: scene.layers,
  };
}

function axisNamesOf(s: CubeSession): Figure['axisNames'] {
  if (s.seen.lie === 'polar') return { lon: 'Azimuth about the centre', lat: 'Distance from the centre' };
  if (s.seen.lie === 'stacked') return { lon: 'Azimuth about the centre', lat: 'Scaled radius' };
  if (s.coordinates.grid !== 'equatorial') return { lon: 'Galactic longitude', lat: 'Galactic latitude' };
  const frame = s.axes.frame === 'galactic' ? 'ICRS' : frameWords(s.axes.frame).name;
  return { lon: `Right ascension (${frame})`, lat: `Declination (${frame})` };
}

/** A figure of panels, as it was chosen. */
export function figureOf(
  s: CubeSession,
  choices: Choices,
  panels: readonly FigurePanel[],
  perRow: number,
  look: Look,
  css: string,
): Figure {
  const { scene, seen, unit, view, axes } = s;
  const quantity = view === 'channel' || view === 'peak' ? 'Brightness' : VIEWS[view].label;
  // a figure has coordinates at its edges, also where the map's lines are switched off
  const plain = skyMapping(seen.sky, axes.frame, 'galactic');
  return {
    columns: choices.columns,
    colours: coloursOf(choices.ground),
    font: { family: FAMILY, css },
    nx: seen.nx,
    ny: seen.ny,
    section: sectionFor(s, choices.part),
    panels,
    perRow,
    graticule: scene.graticule ?? ((v) => graticule(v, plain)),
    axisNames: axisNamesOf(s),
    beam: scene.beam,
    furniture: scene.furniture ?? null,
    bar: colourBar(look, `${quantity}${unit ? `, ${unit}` : ''}`),
    source: s.cube.name,
    caption: choices.withCaption ? choices.caption : '',
  };
}

/** The caption to begin with; `channels` for a sheet or a loop, by rising velocity. */
export function captionOf(s: CubeSession, region: string | null, channels: readonly number[] | null): string {
  const { axes, view, wcs, model, modelSource, shell } = s;
  const look = channels ? s.channelLook : s.look;
  const shown = channels ?? (view === 'channel' ? [s.channel] : []);
  const [first, last] = [shown[0], shown[shown.length - 1]];
  const marks = s.marks.filter((m) => shown.includes(m.channel));
  return captionWords({
    cube: s.cube.name,
    region,
    channels:
      first === undefined || last === undefined
        ? null
        : {
            first,
            last,
            count: shown.length,
            velocities: [wcs.velocityOf(first), wcs.velocityOf(last)],
          },
    map: shown.length === 0 && view !== 'channel' ? VIEWS[view].long : null,
    channelWidth: axes.spectral.channelWidth,
    velocityFrame: axes.spectral.frame,
    palette: look.palette,
    tone: look.tone,
    window: windowWords(look.window, channels ? axes.unit : s.unit),
    stated: channels ? [] : [...s.stated, ...(s.contours.words ? [s.contours.words] : [])],
    shell: shell?.name ?? null,
    marks: marks.length,
    unsure: marks.some((m) => m.unsure),
    ownRing: s.live.readings.some((r) => r.ring && shown.includes(r.channel)),
    ...layersOf(channels ? null : s),
    model: model && modelSource ? { source: modelSource, ...model } : null,
    beam: s.seen.lie === 'polar' || s.seen.lie === 'stacked' ? null : axes.beam,
  });
}

/** What a caption says of the layers; sheets and loops show none. */
function layersOf(s: CubeSession | null) {
  const drawn = s?.scene.layers;
  const fit = s?.layers.fits.find(({ id }) => id === s.seeing.marksOf);
  return {
    traced: drawn ? drawn.traced.length + drawn.missed.length > 0 : false,
    frozenBy:
      fit && drawn && drawn.frozen.length > 0
        ? `a fit of ${[fit.createdBy?.name, fit.createdAt.slice(0, 10)].filter(Boolean).join(', ')}`
        : null,
    otherShells: (drawn?.shells.length ?? 0) > 0,
  };
}
