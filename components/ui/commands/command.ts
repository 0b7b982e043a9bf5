/** What can be done on a screen, as a record: buttons, keys and the `?` list all read it. */
export interface Command {
  /** Stable, like 'channel.next'. */
  name: string;
  /** As the list and a button say it. */
  label: string;
  /** Keys as one presses them: 'ArrowRight', 'Shift+ArrowRight', 'Mod+z' (Ctrl, or Cmd on a Mac), '?', 'Delete'. */
  keys?: readonly string[];
  /** Heading in the list. */
  group?: string;
  /** false: not now; the key then does nothing. */
  enabled?: boolean;
  perform: () => void;
}

export interface KeyPress {
  key: string;
  shiftKey: boolean;
  ctrlKey: boolean;
  metaKey: boolean;
  altKey: boolean;
}

/** Whether a key press is this combination. A printed sign such as '?' carries its own shift. */
export function matches(combination: string, press: KeyPress): boolean {
  const parts = combination.split('+');
  const key = parts.pop() || '+';
  const mod = press.ctrlKey || press.metaKey;
  if (parts.includes('Mod') !== mod || parts.includes('Alt') !== press.altKey) return false;
  const printed = key.length === 1 && !/[a-z0-9]/i.test(key);
  if (!printed && parts.includes('Shift') !== press.shiftKey) return false;
  return key.length === 1 ? key.toLowerCase() === press.key.toLowerCase() : key === press.key;
}

/** The command a key press stands for: the last one registered wins, so a screen's own comes before the frame's. */
export function commandFor(commands: readonly Command[], press: KeyPress): Command | null {
  for (let i = commands.length - 1; i >= 0; i--) {
    const command = commands[i]!;
    if (command.enabled !== false && command.keys?.some((k) => matches(k, press))) return command;
  }
  return null;
}

const signs: Record<string, string> = {
  ArrowRight: '→',
  ArrowLeft: '←',
  ArrowUp: '↑',
  ArrowDown: '↓',
  Mod: 'Ctrl',
  Escape: 'Esc',
  ' ': 'Space',
};

/** 'Mod+z' as a person reads it: ['Ctrl', 'Z']. */
export const readable = (combination: string): string[] => {
  const parts = combination.split('+');
  const last = parts.pop() || '+';
  return [...parts.filter(Boolean), last].map((p) => signs[p] ?? (p.length === 1 ? p.toUpperCase() : p));
};
