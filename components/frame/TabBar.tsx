import { usePathname } from 'expo-router';
import { View } from 'react-native';
import { Icon } from '../ui/Icon';
import { Press } from '../ui/Press';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { hairline, inset, layout, radius, space, touch } from '../ui/tokens';
import { useWide } from '../ui/useWide';
import { holds, sections } from './sections';

/** The phone's navigation, under the thumb. */
export function TabBar({ inbox }: { inbox: number }) {
  const { color } = useTheme();
  const path = usePathname();
  const { low } = useWide();
  const minHeight = low ? touch : layout.tabBar;
  return (
    <View
      role="navigation"
      aria-label="Main"
      style={{
        flexDirection: 'row',
        minHeight,
        backgroundColor: color.panel,
        borderTopWidth: hairline,
        borderTopColor: color.line,
        paddingBottom: inset('bottom'),
      }}
    >
      {sections.map((section) => {
        const current = holds(section, path);
        const tone = current ? 'text' : 'quiet';
        const waiting = section.href === '/inbox' ? inbox : 0;
        return (
          <Press
            key={section.href}
            href={section.href}
            {...(current && ({ 'aria-current': 'page' } as object))}
            style={{
              flex: 1,
              flexDirection: low ? 'row' : 'column',
              alignItems: 'center',
              justifyContent: 'center',
              gap: space(low ? 2 : 1),
              minHeight,
            }}
          >
            <View>
              <Icon name={section.icon} size={22} tone={tone} />
              {waiting > 0 && (
                <View
                  style={{
                    position: 'absolute',
                    top: -space(1),
                    left: space(4),
                    minWidth: space(4),
                    paddingHorizontal: space(1),
                    alignItems: 'center',
                    borderRadius: radius.round,
                    backgroundColor: color.person,
                  }}
                >
                  <Text size="small" tone="onPerson" weight="semibold">
                    {waiting}
                  </Text>
                </View>
              )}
            </View>
            <Text size="small" tone={tone} weight={current ? 'semibold' : 'regular'}>
              {section.label}
            </Text>
          </Press>
        );
      })}
    </View>
  );
}
