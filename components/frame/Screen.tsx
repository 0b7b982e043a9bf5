import type { Href } from 'expo-router';
import { useEffect, useRef, type ReactNode, type RefObject } from 'react';
import { Platform, ScrollView, View } from 'react-native';
import { useInboxCount } from '@/hooks/useInbox';
import { useConnected } from '@/hooks/useLiveEvents';
import { IconButton } from '../ui/Button';
import { Sign } from '../ui/Icon';
import { Press, type PressState } from '../ui/Press';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { hairline, inset, layout, radius, space, touch } from '../ui/tokens';
import { useWide } from '../ui/useWide';
import { TabBar } from './TabBar';
import { TopBar, type Crumb } from './TopBar';

export interface ScreenProps {
  /** Heading of the screen and, with the product's name, title of the document. */
  title: string;
  /** Title of the document where the heading alone would be that of another screen too. */
  pageTitle?: string;
  subtitle?: string;
  /** Where one is, for the wide window; by default the title alone. */
  crumbs?: readonly Crumb[];
  /** The phone's way back; screens of the tab bar have none. */
  back?: Href;
  /** Short state or small control in the head: 'All marks saved'. */
  aside?: ReactNode;
  /** Buttons beside the heading in the page; their room is kept while they are null. */
  actions?: ReactNode;
  /** The content takes all the room and scrolls by itself; no heading in the page. */
  full?: boolean;
  /** For running text and forms. */
  narrow?: boolean;
  children: ReactNode;
}

/** A screen in its frame: head, main landmark, the phone's tabs. */
export function Screen({
  title,
  pageTitle = title,
  subtitle,
  crumbs,
  back,
  aside,
  actions,
  full,
  narrow,
  children,
}: ScreenProps) {
  const { color } = useTheme();
  const { wide } = useWide();
  const inbox = useInboxCount();
  const connected = useConnected();
  const main = useRef<View>(null);
  useDocumentTitle(pageTitle);
  useEffect(() => {
    // after a change of screen the focus would be lost: the next Tab begins in the new content
    if (Platform.OS !== 'web' || document.activeElement !== document.body) return;
    (main.current as unknown as HTMLElement | null)?.focus({ preventScroll: true });
  }, []);
  const state = connected ? (
    aside
  ) : (
    <Text size="small" tone="person" role="status">
      No connection, trying again
    </Text>
  );
  return (
    <View
      style={{
        flex: 1,
        backgroundColor: color.ground,
        minHeight: 0,
        paddingTop: inset('top'),
        paddingLeft: inset('left'),
        paddingRight: inset('right'),
        paddingBottom: wide ? inset('bottom') : 0, // the phone's tabs keep clear themselves
      }}
    >
      <SkipLink main={main} />
      {wide ? (
        <TopBar crumbs={crumbs ?? [{ label: title }]} aside={state} inbox={inbox} heading={full === true} />
      ) : (
        <PhoneHead title={title} subtitle={subtitle} back={back} aside={state} />
      )}
      <View role="main" ref={main} tabIndex={-1} style={{ flex: 1, minHeight: 0 }}>
        {full ? (
          children
        ) : (
          <ScrollView style={{ flex: 1 }} contentContainerStyle={{ flexGrow: 1 }}>
            <View
              style={{
                width: '100%',
                maxWidth: narrow ? layout.readable : layout.content,
                alignSelf: narrow && wide ? 'center' : 'flex-start',
                padding: wide ? space(5) : space(4),
                paddingBottom: space(12),
                gap: space(4),
              }}
            >
              {(wide || (actions !== undefined && actions !== false)) && (
                <PageHead title={title} subtitle={subtitle} actions={actions} wide={wide} />
              )}
              {children}
            </View>
          </ScrollView>
        )}
      </View>
      {!wide && <TabBar inbox={inbox} />}
    </View>
  );
}

/** The first stop of the Tab key: past head and navigation; seen only while it has the focus. */
function SkipLink({ main }: { main: RefObject<View | null> }) {
  const { color } = useTheme();
  return (
    <Press
      onPress={() => (main.current as unknown as HTMLElement | null)?.focus({ preventScroll: true })}
      style={({ focused }: PressState) => ({
        position: 'absolute',
        left: space(2),
        top: focused ? space(1) : -layout.topBar * 2,
        zIndex: 50,
        minHeight: touch,
        justifyContent: 'center',
        paddingHorizontal: space(4),
        borderRadius: radius.small,
        backgroundColor: color.action,
      })}
    >
      <Text weight="semibold" tone="onAction">
        Skip to the content
      </Text>
    </Press>
  );
}

/** A name without a space must not push the page sideways. */
const anywhere = { overflowWrap: 'anywhere' } as object;

function PageHead({
  title,
  subtitle,
  actions,
  wide,
}: {
  title: string;
  subtitle?: string;
  actions?: ReactNode;
  wide: boolean;
}) {
  return (
    <View
      style={{
        flexDirection: 'row',
        alignItems: 'center',
        flexWrap: 'wrap',
        gap: space(3),
        justifyContent: 'space-between',
        minHeight: actions === undefined ? undefined : touch,
      }}
    >
      {wide && (
        <View
          style={{
            flexDirection: 'row',
            alignItems: 'baseline',
            gap: space(3),
            flexShrink: 1,
            flexWrap: 'wrap',
          }}
        >
          <Text heading={1} size="title" weight="bold" style={anywhere}>
            {title}
          </Text>
          {subtitle && (
            <Text tone="quiet" size="body">
              {subtitle}
            </Text>
          )}
        </View>
      )}
      {actions && (
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2), alignItems: 'center' }}>
          {actions}
        </View>
      )}
    </View>
  );
}

function PhoneHead({
  title,
  subtitle,
  back,
  aside,
}: Pick<ScreenProps, 'title' | 'subtitle' | 'back' | 'aside'>) {
  const { color } = useTheme();
  return (
    <View
      role="banner"
      style={{
        flexDirection: 'row',
        alignItems: 'center',
        gap: back ? space(1) : space(3),
        minHeight: layout.topBar,
        paddingLeft: back ? 0 : space(4),
        paddingRight: space(4),
        borderBottomWidth: hairline,
        borderBottomColor: color.line,
      }}
    >
      {back ? <IconButton icon="back" label="Back" href={back} /> : <Sign />}
      <View style={{ flex: 1, minWidth: 0 }}>
        <Text heading={1} size={subtitle ? 'body' : 'lead'} weight="bold" numberOfLines={1}>
          {title}
        </Text>
        {subtitle && (
          <Text size="small" tone="quiet" numberOfLines={1}>
            {subtitle}
          </Text>
        )}
      </View>
      {aside}
    </View>
  );
}

export function useDocumentTitle(title: string) {
  useEffect(() => {
    if (Platform.OS === 'web') document.title = title === 'Outswell' ? title : `${title} · Outswell`;
  }, [title]);
}
