import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { zoomMap } from '@/components/cube/zoomMap';
import { windowWords } from '@/components/cube/words';
import { IconButton } from '@/components/ui/Button';
import { ToggleChip } from '@/components/ui/Chip';
import { useShowKeys } from '@/components/ui/commands/CommandsProvider';
import { space } from '@/components/ui/tokens';

/** Marking, undo, zoom and look, above the map. */
export function Tools({
  lookOpen,
  onLook,
  compact,
  roomy,
}: {
  lookOpen: boolean;
  onLook: () => void;
  /** Without the buttons that pinching and keys replace. */
  compact?: boolean;
  /** Room for palette and tone beside the window. */
  roomy?: boolean;
}) {
  const { markMode, setMarkMode, shell, mayMark, reading, look, unit, store, view } = useSession();
  const showKeys = useShowKeys();
  const { undo, redo, ready } = reading.state;
  const canMark = shell !== null && mayMark;
  const window = windowWords(look.window, unit);
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
            selected={markMode && view === 'channel'}
            disabled={view !== 'channel'}
            onPress={() => setMarkMode(!markMode)}
          />
          <IconButton
            icon="undo"
            label="Undo"
            disabled={!ready || undo.length === 0}
            onPress={() => reading.dispatch({ type: 'undo' })}
          />
          <IconButton
            icon="redo"
            label="Redo"
            disabled={!ready || redo.length === 0}
            onPress={() => reading.dispatch({ type: 'redo' })}
          />
        </>
      )}
      {!compact && (
        <>
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
