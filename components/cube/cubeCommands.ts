import type { CubeSession } from '@/components/cube/cubeSession';
import { VIEW_ORDER } from '@/components/cube/views';
import { markCommands } from '@/components/cube/markCommands';
import { zoomMap } from '@/components/cube/zoomMap';
import type { Command } from '@/components/ui/commands/command';
import { PALETTES } from '@/shared/image/palettes';
import { TONES } from '@/shared/image/tone';

const after = <T>(list: readonly T[], now: T): T => list[(list.indexOf(now) + 1) % list.length]!;

export interface CommandView {
  onLook: () => void;
  /** null while the fit of record cannot be run. */
  onRun: (() => void) | null;
}

/** The cube screen's keys; the list under ? is made from these. */
export function cubeCommands(s: CubeSession, view: CommandView): Command[] {
  const canMark = s.shell !== null && s.mayMark && s.reading.state.ready;
  const { look, store } = s;
  const chosen = s.chosen.map((mark) => mark.id);
  const last = s.order.channels.length - 1;
  const marked = s.live.readings;
  const markedBeside = (way: 1 | -1) => {
    const next =
      way > 0 ? marked.find((r) => r.velocity > s.velocity) : marked.findLast((r) => r.velocity < s.velocity);
    if (next) s.showChannel(next.channel);
  };
  return [
    {
      name: 'channel.next',
      label: 'Next channel, higher velocity',
      keys: ['ArrowRight'],
      group: 'Channels',
      perform: () => s.stepChannel(1),
    },
    {
      name: 'channel.before',
      label: 'Channel before, lower velocity',
      keys: ['ArrowLeft'],
      group: 'Channels',
      perform: () => s.stepChannel(-1),
    },
    {
      name: 'channel.next5',
      label: 'Five channels on',
      keys: ['Shift+ArrowRight'],
      group: 'Channels',
      perform: () => s.stepChannel(5),
    },
    {
      name: 'channel.before5',
      label: 'Five channels back',
      keys: ['Shift+ArrowLeft'],
      group: 'Channels',
      perform: () => s.stepChannel(-5),
    },
    {
      name: 'channel.first',
      label: 'Lowest velocity',
      keys: ['Home'],
      group: 'Channels',
      perform: () => s.stepChannel(-last),
    },
    {
      name: 'channel.last',
      label: 'Highest velocity',
      keys: ['End'],
      group: 'Channels',
      perform: () => s.stepChannel(last),
    },
    {
      name: 'channel.marked.next',
      label: 'Next channel with marks',
      keys: ['.'],
      group: 'Channels',
      enabled: marked.length > 0,
      perform: () => markedBeside(1),
    },
    {
      name: 'channel.marked.before',
      label: 'Channel with marks before',
      keys: [','],
      group: 'Channels',
      enabled: marked.length > 0,
      perform: () => markedBeside(-1),
    },

    { name: 'map.in', label: 'Zoom in', keys: ['+', '='], group: 'Map', perform: () => zoomMap(store, 1.5) },
    { name: 'map.out', label: 'Zoom out', keys: ['-'], group: 'Map', perform: () => zoomMap(store, 1 / 1.5) },
    {
      name: 'map.whole',
      label: 'Whole image',
      keys: ['0'],
      group: 'Map',
      perform: () => zoomMap(store, null),
    },
    {
      name: 'map.look',
      label: 'Palette, tone and brightness window',
      keys: ['w'],
      group: 'Map',
      perform: view.onLook,
    },
    {
      name: 'map.view',
      label: 'Channel, or the next map of all channels',
      keys: ['v'],
      group: 'Map',
      perform: () => s.setView(after(VIEW_ORDER, s.view)),
    },
    {
      name: 'map.palette',
      label: 'Next palette',
      keys: ['p'],
      group: 'Map',
      perform: () => look.setPalette(after(PALETTES, look.palette)),
    },
    {
      name: 'map.tone',
      label: 'Next tone',
      keys: ['t'],
      group: 'Map',
      perform: () => look.setTone(after(TONES, look.tone)),
    },

    ...markCommands(s, canMark, chosen),
    {
      name: 'mark.undo',
      label: 'Undo',
      keys: ['Mod+z', 'z'],
      group: 'Marks',
      enabled: canMark,
      perform: () => s.reading.dispatch({ type: 'undo' }),
    },
    {
      name: 'mark.redo',
      label: 'Redo',
      keys: ['Mod+Shift+z', 'Shift+z', 'Mod+y'],
      group: 'Marks',
      enabled: canMark,
      perform: () => s.reading.dispatch({ type: 'redo' }),
    },
    {
      name: 'fit.run',
      label: 'Run the fit of record',
      keys: ['Shift+Enter'],
      group: 'Marks',
      enabled: view.onRun !== null,
      perform: () => view.onRun?.(),
    },
  ];
}
