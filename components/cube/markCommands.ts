import type { CubeSession } from '@/components/cube/cubeSession';
import { MAP_TOOLS, TOOL_ORDER } from '@/components/cube/mapTools';
import type { Command } from '@/components/ui/commands/command';

/** What keys do with tools and marks. On the map itself arrows nudge what is selected, or move the crosshair. */
export function markCommands(s: CubeSession, canMark: boolean, chosen: readonly string[]): Command[] {
  const some = canMark && chosen.length > 0;
  const own = s.marks.filter((mark) => mark.channel === s.channel);
  const [best] = s.next;
  return [
    ...TOOL_ORDER.map((tool) => ({
      name: `tool.${tool}`,
      label: MAP_TOOLS[tool].label,
      keys: [MAP_TOOLS[tool].key],
      group: 'Marks',
      enabled: canMark,
      // the key of the tool in hand puts it down
      perform: () => s.setTool(s.tool === tool ? 'move' : tool),
    })),
    {
      name: 'mark.all',
      label: 'Select the marks of this channel',
      keys: ['a'],
      group: 'Marks',
      enabled: canMark && own.length > 0,
      perform: () => s.selectMany(own.map((mark) => mark.id)),
    },
    {
      name: 'mark.unsure',
      label: 'Selected marks: sure or unsure',
      keys: ['u'],
      group: 'Marks',
      enabled: some,
      perform: () => s.describeMarks(chosen, { unsure: !s.chosen.every((mark) => mark.unsure) }),
    },
    {
      name: 'mark.remove',
      label: 'Delete the selected marks',
      keys: ['Delete', 'Backspace'],
      group: 'Marks',
      enabled: some,
      perform: () => s.removeMarks(chosen),
    },
    {
      name: 'mark.none',
      label: 'Deselect',
      keys: ['Escape'],
      group: 'Marks',
      enabled: chosen.length > 0,
      perform: () => s.select(null),
    },
    {
      name: 'suggest.take',
      label: 'Take all suggested marks',
      keys: ['Shift+S'],
      group: 'Marks',
      enabled: canMark && s.ghosts.length > 0,
      perform: () => s.takeGhosts(s.ghosts.map((ghost) => ghost.id)),
    },
    {
      name: 'suggest.mode',
      label: s.suggesting ? 'Suggest no marks' : 'Suggest marks',
      keys: ['s'],
      group: 'Marks',
      enabled: canMark,
      perform: () => s.setSuggesting(!s.suggesting),
    },
    {
      name: 'mark.next',
      label: 'The channel where marks would help most',
      keys: ['n'],
      group: 'Marks',
      enabled: best !== undefined,
      perform: () => best && s.showChannel(best.channel),
    },
  ];
}
