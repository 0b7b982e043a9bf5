import { useState, type ReactNode } from 'react';
import { ScrollView, View } from 'react-native';
import { Press } from './Press';
import { Text } from './Text';
import { useTheme } from './theme';
import { hairline, radius, space, touch } from './tokens';

export interface SheetTab {
  key: string;
  label: string;
  content: ReactNode;
}

/** Panes behind tabs: the sheet under a phone's map, or a column's panes. Give `tab` to hold the choice outside. */
export function Sheet({
  label,
  tabs,
  tab,
  onTab,
  aside,
  scroll = true,
}: {
  label: string;
  tabs: readonly SheetTab[];
  tab?: string;
  onTab?: (key: string) => void;
  aside?: ReactNode;
  scroll?: boolean;
}) {
  const { color } = useTheme();
  const [own, setOwn] = useState(tabs[0]?.key);
  const current = tabs.find((t) => t.key === (tab ?? own)) ?? tabs[0];
  const choose = (key: string) => {
    setOwn(key);
    onTab?.(key);
  };
  const keys = {
    onKeyDown: (e: { key: string; preventDefault(): void; currentTarget: unknown }) => {
      const by = e.key === 'ArrowRight' ? 1 : e.key === 'ArrowLeft' ? -1 : 0;
      const next = tabs[(tabs.findIndex((t) => t.key === current?.key) + by + tabs.length) % tabs.length];
      if (by === 0 || !next) return;
      e.preventDefault();
      choose(next.key);
      const list = e.currentTarget as HTMLElement;
      setTimeout(() => list.querySelector<HTMLElement>('[aria-selected="true"]')?.focus());
    },
  } as object;
  return (
    <View
      style={{
        flex: 1,
        minHeight: 0,
        backgroundColor: color.panel,
        borderTopLeftRadius: radius.large,
        borderTopRightRadius: radius.large,
        borderTopWidth: hairline,
        borderTopColor: color.line,
      }}
    >
      <View
        style={{ flexDirection: 'row', alignItems: 'center', paddingHorizontal: space(2), gap: space(2) }}
      >
        <View role="tablist" aria-label={label} {...keys} style={{ flexDirection: 'row', flex: 1 }}>
          {tabs.map((t) => {
            const selected = t.key === current?.key;
            return (
              <Press
                key={t.key}
                role="tab"
                aria-label={t.label}
                aria-selected={selected}
                tabIndex={selected ? 0 : -1}
                onPress={() => choose(t.key)}
                style={{
                  minHeight: touch,
                  minWidth: touch,
                  paddingHorizontal: space(2),
                  justifyContent: 'center',
                }}
              >
                <View
                  style={{
                    borderBottomWidth: space(0.5),
                    borderBottomColor: selected ? color.text : 'transparent',
                  }}
                >
                  <Text tone={selected ? 'text' : 'quiet'} weight={selected ? 'semibold' : 'regular'}>
                    {t.label}
                  </Text>
                </View>
              </Press>
            );
          })}
        </View>
        {aside}
      </View>
      <View role="tabpanel" aria-label={current?.label} style={{ flex: 1, minHeight: 0 }}>
        {scroll ? (
          <ScrollView key={current?.key} contentContainerStyle={{ padding: space(3), gap: space(3) }}>
            {current?.content}
          </ScrollView>
        ) : (
          current?.content
        )}
      </View>
    </View>
  );
}
