import { useFonts } from 'expo-font';
import { Slot } from 'expo-router';
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
  if (!loaded && !failed) return null; // a moment; text set twice would jump
  return (
    <SWRConfig value={cacheOptions}>
      <ThemeProvider>
        <ToastProvider>
          <CommandsProvider>
            <UploadsProvider>
              <Slot />
            </UploadsProvider>
          </CommandsProvider>
        </ToastProvider>
      </ThemeProvider>
    </SWRConfig>
  );
}
