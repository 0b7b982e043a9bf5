import { Pressable } from 'react-native';

/**
 * The ground behind a dialog or a menu: a press on it closes them. It comes last, below the rest, because the focus of
 * a new modal goes to the first thing in it that takes focus.
 */
export function Backdrop({ onPress }: { onPress: () => void }) {
  return (
    <Pressable
      aria-hidden
      tabIndex={-1}
      onPress={onPress}
      style={{ position: 'absolute', top: 0, left: 0, right: 0, bottom: 0, zIndex: -1 }}
    />
  );
}
