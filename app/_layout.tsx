import { useFonts } from 'expo-font';
import { Slot } from 'expo-router';
import { View } from 'react-native';
import { SWRConfig } from 'swr';
import { CommandsProvider } from '@/components/ui/commands/CommandsProvider';
import { ThemeProvider } from '@/components/ui/theme';
import { ToastProvider } from '@/components/ui/Toast';
import { fonts } from '@/components/ui/tokens';
import { cacheOptions } from '@/hooks/cache';
import { UploadsProvider } from '@/hooks/useUploads';

const files = {
  [fonts.regular]: require('@/fonts/AtkinsonHyperlegibleNext_400Regular.ttf'),
  [fonts.semibold]: require('@/fonts/AtkinsonHyperlegibleNext_600SemiBold.ttf'),
  [fonts.bold]: require('@/fonts/AtkinsonHyperlegibleNext_700Bold.ttf'),
  [fonts.mono]: require('@/fonts/AtkinsonHyperlegibleMono_400Regular.ttf'),
  [fonts.monoSemibold]: require('@/fonts/AtkinsonHyperlegibleMono_600SemiBold.ttf'),
};

export default function RootLayout() {
  const [loaded, failed] = useFonts(files);
  // The navigator must be there from the first render on, and its data may come meanwhile; but text that is set twice
  // would jump, so nothing is seen for the moment that the fonts take.
  const seen = loaded || failed !== null;
  return (
    <SWRConfig value={cacheOptions}>
      <ThemeProvider>
        <ToastProvider>
          <CommandsProvider>
            <UploadsProvider>
              <View style={{ flex: 1, opacity: seen ? 1 : 0 }}>
                <Slot />
              </View>
            </UploadsProvider>
          </CommandsProvider>
        </ToastProvider>
      </ThemeProvider>
    </SWRConfig>
  );
}
