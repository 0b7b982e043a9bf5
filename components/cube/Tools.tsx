import { View } from 'react-native';
import { MAP_TOOLS, TOOL_ORDER } from '@/components/cube/mapTools';
import { useSession } from '@/components/cube/session';
import { zoomMap } from '@/components/cube/zoomMap';
import { windowWords } from '@/components/cube/words';
import type { MapTool } from '@/components/map/gestures';
import { IconButton } from '@/components/ui/Button';
import { ToggleChip } from '@/components/ui/Chip';
import type { IconName } from '@/components/ui/Icon';
import { Menu, type MenuItem } from '@/components/ui/Menu';
import { useShowKeys } from '@/components/ui/commands/CommandsProvider';
import { space } from '@/components/ui/tokens';

const ICONS: Record<MapTool, IconName> = { move: 'hand', mark: 'target', lasso: 'lasso', ring: 'ring' };

/** Marking, undo, zoom and look, above the map. */
export function Tools({
  lookOpen,
  onLook,
  compact,
  roomy,
  full,
}: {
  lookOpen: boolean;
  onLook: () => void;
  /** Without the buttons that pinching and keys replace. */
  compact?: boolean;
  /** Room for palette and tone beside the window. */
  roomy?: boolean;
  /** Room for every tool side by side; else they lie in a menu. */
  full?: boolean;
}) {
  const { tool, setTool, suggesting, setSuggesting, shell, mayMark, reading, look, unit, store, view, film } =
    useSession();
  const showKeys = useShowKeys();
  const { undo, redo, ready } = reading.state;
  const canMark = shell !== null && mayMark;
  const window = windowWords(look.window, unit);
  const off = view === 'channel' ? undefined : true;
  const canRedo = ready && redo.length > 0;
  const toolItems: MenuItem[] = [
    ...TOOL_ORDER.map((t) => ({
      label: MAP_TOOLS[t].label,
      icon: ICONS[t],
      selected: tool === t,
      disabled: off,
      perform: () => setTool(t),
    })),
    {
      label: suggesting ? 'Suggest no marks' : 'Suggest marks',
      icon: 'shells',
      disabled: off,
      perform: () => setSuggesting(!suggesting),
    },
    ...(compact
      ? [
          {
            label: 'Redo',
            icon: 'redo' as const,
            disabled: !canRedo,
            perform: () => reading.dispatch({ type: 'redo' }),
          },
        ]
      : []),
  ];
  return (
    <View
      role="toolbar"
      aria-label="Map"
      style={{
        flexDirection: 'row',
        alignItems: 'center',
        flexWrap: 'wrap',
        justifyContent: 'flex-end',
        flexShrink: 1,
        columnGap: space(1),
      }}
    >
      {canMark && (
        <>
          <ToggleChip
            label="Mark"
            selected={tool === 'mark' && off === undefined}
            disabled={off}
            onPress={() => setTool(tool === 'mark' ? 'move' : 'mark')}
          />
          {full ? (
            <>
              {TOOL_ORDER.filter((t) => t !== 'mark').map((t) => (
                <IconButton
                  key={t}
                  icon={ICONS[t]}
                  label={MAP_TOOLS[t].label}
                  selected={tool === t && off === undefined}
                  disabled={off}
                  onPress={() => setTool(t)}
                />
              ))}
              <ToggleChip
                label="Suggest"
                selected={suggesting && off === undefined}
                disabled={off}
                onPress={() => setSuggesting(!suggesting)}
              />
            </>
          ) : (
            <Menu label="Tools" items={toolItems} />
          )}
          <IconButton
            icon="undo"
            label="Undo"
            disabled={!ready || undo.length === 0}
            onPress={() => reading.dispatch({ type: 'undo' })}
          />
          {!compact && (
            <IconButton
              icon="redo"
              label="Redo"
              disabled={!canRedo}
              onPress={() => reading.dispatch({ type: 'redo' })}
            />
          )}
        </>
      )}
      {!compact && (
        <>
          <IconButton
            icon={film.playing ? 'pause' : 'play'}
            label={film.playing ? 'Stop playing' : 'Play back and forth'}
            onPress={film.toggle}
          />
          <IconButton icon="minus" label="Zoom out" onPress={() => zoomMap(store, 1 / 1.5)} />
          <IconButton icon="plus" label="Zoom in" onPress={() => zoomMap(store, 1.5)} />
          <IconButton icon="fit" label="Whole image" onPress={() => zoomMap(store, null)} />
        </>
      )}
      <ToggleChip
        label={roomy ? `${look.palette} · ${look.tone} · ${window}` : window}
        selected={lookOpen}
        onPress={onLook}
      />
      {!compact && <IconButton icon="keys" label="Keys" onPress={showKeys} />}
    </View>
  );
}
