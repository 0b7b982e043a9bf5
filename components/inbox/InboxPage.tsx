import { Fragment, type ReactNode } from 'react';
import { View } from 'react-native';
import { useInbox, type Inbox } from '@/hooks/useInbox';
import { RecordGate } from '../frame/RecordGate';
import { Screen } from '../frame/Screen';
import { CubeRow } from '../regions/CubeRow';
import { ShellRow } from '../shells/ShellRow';
import { Button } from '../ui/Button';
import { EmptyState } from '../ui/EmptyState';
import { count } from '../ui/format';
import { Icon } from '../ui/Icon';
import { Panel, Rule } from '../ui/Panel';
import { Press, type PressState } from '../ui/Press';
import { SkeletonRows } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { space, touch } from '../ui/tokens';

const isEmpty = (i: Inbox) => i.failed.length + i.reading.length + i.unfitted.length + i.fitting.length === 0;

/** What waits: for somebody to act, and what the workers have in hand. */
export function InboxPage() {
  const inbox = useInbox();
  return (
    <Screen title="Inbox" narrow>
      <RecordGate read={inbox} what="messages" skeleton={<SkeletonRows rows={3} height={64} />}>
        {(data) =>
          isEmpty(data) ? (
            <EmptyState
              icon="inbox"
              title="Nothing waits for you"
              action={<Button label="To the regions" href="/regions" />}
            >
              Failed cubes, cubes being read, your shells without an adopted fit, and running fits appear
              here.
            </EmptyState>
          ) : (
            <>
              <Group title="Your shells to fit" show={data.unfitted.length}>
                {data.unfitted.map((s) => (
                  <ShellRow key={s.id} shell={s} />
                ))}
              </Group>
              <Group title="Cubes that failed" show={data.failed.length}>
                {data.failed.map((c) => (
                  <CubeRow key={c.id} cube={c} />
                ))}
              </Group>
              <Group title="Cubes being read" show={data.reading.length}>
                {data.reading.map((c) => (
                  <CubeRow key={c.id} cube={c} />
                ))}
              </Group>
              <Group title="Fits running" show={data.fitting.length}>
                {data.fitting.map((r) => (
                  <View key={r.id} role="listitem">
                    <Press
                      href={`/regions/${r.id}`}
                      aria-label={`${count(r.waiting.runningFits, 'fit')} running in ${r.name}`}
                      style={({ hovered }: PressState) => ({
                        minHeight: touch + space(2),
                        flexDirection: 'row',
                        alignItems: 'center',
                        gap: space(2),
                        paddingHorizontal: space(4),
                        opacity: hovered ? 0.85 : 1,
                      })}
                    >
                      <Text weight="semibold" style={{ flex: 1 }}>
                        {r.name}
                      </Text>
                      <Text tone="quiet">{count(r.waiting.runningFits, 'fit')}</Text>
                      <Icon name="next" size={16} tone="quiet" />
                    </Press>
                  </View>
                ))}
              </Group>
            </>
          )
        }
      </RecordGate>
    </Screen>
  );
}

function Group({ title, show, children }: { title: string; show: number; children: ReactNode[] }) {
  if (show === 0) return null;
  return (
    <Panel
      flush
      title={title}
      aside={
        <Text mono tone="quiet">
          {show}
        </Text>
      }
    >
      <View role="list" aria-label={title} style={{ paddingBottom: space(1) }}>
        {children.map((child, i) => (
          <Fragment key={i}>
            {i > 0 && <Rule />}
            {child}
          </Fragment>
        ))}
      </View>
    </Panel>
  );
}
