import { usePathname, type Href } from 'expo-router';
import { Fragment, type ReactNode } from 'react';
import { View } from 'react-native';
import { useMe } from '@/hooks/useMe';
import { Sign } from '../ui/Icon';
import { Press, type PressState } from '../ui/Press';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { hairline, layout, radius, space, touch } from '../ui/tokens';
import { holds, sections } from './sections';

export interface Crumb {
  label: string;
  href?: Href;
}

export function Wordmark() {
  return (
    <Press
      href="/regions"
      aria-label="Outswell"
      style={{ flexDirection: 'row', alignItems: 'center', gap: space(3), minHeight: touch }}
    >
      <Sign />
      <Text size="lead" weight="bold">
        Outswell
      </Text>
    </Press>
  );
}

/** The wide window's head: wordmark, sections, where one is, and what the screen has to say. */
export function TopBar({
  crumbs,
  aside,
  inbox,
  heading,
}: {
  crumbs: readonly Crumb[];
  aside?: ReactNode;
  inbox: number;
  heading: boolean;
}) {
  const { color } = useTheme();
  const path = usePathname();
  const { data: me } = useMe();
  const bar = sections.filter((s) => s.href !== '/you' && s.href !== '/inbox');
  return (
    <View
      role="banner"
      style={{
        flexDirection: 'row',
        alignItems: 'center',
        gap: space(4),
        minHeight: layout.topBar,
        paddingHorizontal: space(5),
        borderBottomWidth: hairline,
        borderBottomColor: color.line,
        backgroundColor: color.ground,
      }}
    >
      <Wordmark />
      <View role="navigation" aria-label="Main" style={{ flexDirection: 'row', alignItems: 'center' }}>
        {bar.map((section) => {
          const current = holds(section, path);
          return (
            <Press
              key={section.href}
              href={section.href}
              aria-label={section.label}
              {...(current && ({ 'aria-current': 'page' } as object))}
              style={{
                minHeight: layout.topBar - hairline,
                justifyContent: 'center',
                paddingHorizontal: space(3),
              }}
            >
              {({ hovered }: PressState) => (
                <View
                  style={{
                    paddingVertical: space(1),
                    borderBottomWidth: space(0.5),
                    borderBottomColor: current ? color.text : hovered ? color.control : 'transparent',
                  }}
                >
                  <Text tone={current ? 'text' : 'quiet'} weight={current ? 'semibold' : 'regular'}>
                    {section.label}
                  </Text>
                </View>
              )}
            </Press>
          );
        })}
      </View>
      {(heading || crumbs.length > 1) && (
        <>
          <View style={{ width: hairline, height: space(6), backgroundColor: color.line }} />
          <Crumbs crumbs={crumbs} heading={heading} />
        </>
      )}
      <View style={{ flex: 1 }} />
      {aside}
      <Press href="/inbox" style={{ minHeight: touch, justifyContent: 'center' }}>
        <View
          style={{
            paddingHorizontal: space(3),
            paddingVertical: space(1),
            borderRadius: radius.round,
            backgroundColor: color.chip,
          }}
        >
          <Text size="small">{inbox > 0 ? `Inbox ${inbox}` : 'Inbox'}</Text>
        </View>
      </Press>
      <Press
        href="/you"
        aria-label={me ? `${initials(me.name)}, ${me.name}` : 'You'}
        style={{ minHeight: touch, justifyContent: 'center' }}
      >
        <View
          style={{
            width: space(8),
            height: space(8),
            borderRadius: radius.round,
            alignItems: 'center',
            justifyContent: 'center',
            backgroundColor: color.chip,
          }}
        >
          <Text size="small" weight="bold">
            {initials(me?.name ?? '')}
          </Text>
        </View>
      </Press>
    </View>
  );
}

/** Names up to this long stay whole; longer ones make room. */
const SHORT_CRUMB = 20;

function Crumbs({ crumbs, heading }: { crumbs: readonly Crumb[]; heading: boolean }) {
  return (
    <View
      role="navigation"
      aria-label="Where you are"
      style={{ flexDirection: 'row', alignItems: 'center', gap: space(3), flexShrink: 1 }}
    >
      {crumbs.map((crumb, i) => {
        const last = i === crumbs.length - 1;
        const flexShrink = crumb.label.length > SHORT_CRUMB ? 1 : 0;
        const text = (
          <Text tone={last ? 'text' : 'quiet'} numberOfLines={1} heading={last && heading ? 1 : undefined}>
            {crumb.label}
          </Text>
        );
        return (
          <Fragment key={`${i}${crumb.label}`}>
            {i > 0 && (
              <Text tone="quiet" aria-hidden>
                /
              </Text>
            )}
            {crumb.href && !last ? (
              <Press
                href={crumb.href}
                aria-label={crumb.label}
                style={{ minHeight: touch, justifyContent: 'center', flexShrink }}
              >
                {text}
              </Press>
            ) : (
              <View style={{ flexShrink }}>{text}</View>
            )}
          </Fragment>
        );
      })}
    </View>
  );
}

export const initials = (name: string): string =>
  name
    .split(/\s+/)
    .filter(Boolean)
    .map((part) => part[0]!.toUpperCase())
    .filter((_, i, all) => i === 0 || i === all.length - 1)
    .join('') || '?';
