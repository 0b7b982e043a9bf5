import {
  createContext,
  useCallback,
  useContext,
  useEffect,
  useMemo,
  useRef,
  useState,
  type ReactNode,
} from 'react';
import { View } from 'react-native';
import { Button, IconButton } from './Button';
import { Text } from './Text';
import { useTheme } from './theme';
import { hairline, inset, layout, radius, space } from './tokens';
import { useWide } from './useWide';

export interface ToastMessage {
  text: string;
  kind?: 'plain' | 'error';
  /** What takes it back, or goes on from here. */
  action?: { label: string; perform: () => void };
  /** Milliseconds; with an action 10 s unless given, else 5 s. */
  lasts?: number;
}
type Shown = ToastMessage & { id: number };

const Context = createContext<(message: ToastMessage) => void>(() => undefined);

/** Says what just happened, with an undo where there is one: `const say = useToast(); say({ text, action })`. */
export const useToast = () => useContext(Context);

export function ToastProvider({ children }: { children: ReactNode }) {
  const [shown, setShown] = useState<Shown[]>([]);
  const next = useRef(1);
  const say = useCallback((message: ToastMessage) => {
    const id = next.current++;
    setShown((list) => [...list.slice(-1), { ...message, id }]);
  }, []);
  const drop = useCallback((id: number) => setShown((list) => list.filter((m) => m.id !== id)), []);
  const value = useMemo(() => say, [say]);
  const { wide } = useWide();
  return (
    <Context.Provider value={value}>
      {children}
      <View
        pointerEvents="box-none"
        role="status"
        aria-live="polite"
        style={{
          position: 'fixed' as 'absolute',
          left: space(3),
          right: space(3),
          bottom: inset('bottom', wide ? space(4) : layout.tabBar + space(3)),
          alignItems: 'center',
          gap: space(2),
          zIndex: 40,
        }}
      >
        {shown.map((m) => (
          <Snack key={m.id} message={m} onDone={drop} />
        ))}
      </View>
    </Context.Provider>
  );
}

function Snack({ message, onDone }: { message: Shown; onDone: (id: number) => void }) {
  const { color } = useTheme();
  const { id, text, action, kind, lasts = action ? 10_000 : 5_000 } = message;
  useEffect(() => {
    const timer = setTimeout(() => onDone(id), lasts);
    return () => clearTimeout(timer);
  }, [id, lasts, onDone]);
  return (
    <View
      style={{
        flexDirection: 'row',
        alignItems: 'center',
        gap: space(2),
        paddingLeft: space(4),
        paddingRight: space(1),
        paddingVertical: space(1),
        maxWidth: layout.dialog,
        borderRadius: radius.large,
        borderWidth: hairline,
        borderColor: kind === 'error' ? color.error : color.control,
        backgroundColor: color.raised,
        boxShadow: `0 ${space(1)}px ${space(5)}px ${color.shadow}`,
      }}
    >
      <Text tone={kind === 'error' ? 'error' : 'text'} style={{ flexShrink: 1 }}>
        {text}
      </Text>
      {action && (
        <Button
          kind="quiet"
          label={action.label}
          icon={action.label === 'Undo' ? 'undo' : undefined}
          onPress={() => {
            onDone(id);
            action.perform();
          }}
        />
      )}
      <IconButton icon="close" label="Dismiss" size={16} onPress={() => onDone(id)} />
    </View>
  );
}
