import { useEffect, useState } from 'react';
import { ActivityIndicator, Image, View } from 'react-native';
import { useTheme } from '@/components/ui/theme';
import { hairline, radius, space } from '@/components/ui/tokens';

/** Choices settle for this long before the picture is drawn again. */
const SETTLE_MS = 250;

/** What will be saved, small; drawn anew when `key` changes. */
export function Preview({
  ask,
  asked,
}: {
  ask: (signal: AbortSignal) => Promise<string>;
  /** Changes with the choices. */
  asked: string;
}) {
  const { color } = useTheme();
  const [svg, setSvg] = useState<string | null>(null);
  useEffect(() => {
    const controller = new AbortController();
    const timer = setTimeout(() => {
      ask(controller.signal).then(
        (text) => !controller.signal.aborted && setSvg(text),
        () => undefined, // saving says what is wrong
      );
    }, SETTLE_MS);
    return () => {
      clearTimeout(timer);
      controller.abort();
    };
    // `ask` is new at each render; what it asks for is in the key
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [asked]);
  return (
    <View
      style={{
        height: space(70),
        alignItems: 'center',
        justifyContent: 'center',
        borderWidth: hairline,
        borderColor: color.line,
        borderRadius: radius.small,
        backgroundColor: color.chip,
        padding: space(2),
      }}
    >
      {svg ? (
        <Image
          source={{ uri: `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}` }}
          resizeMode="contain"
          accessibilityLabel="What will be saved"
          style={{ width: '100%', height: '100%' }}
        />
      ) : (
        <ActivityIndicator color={color.quiet} />
      )}
    </View>
  );
}
