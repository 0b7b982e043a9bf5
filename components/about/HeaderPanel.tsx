import { useState } from 'react';
import { View } from 'react-native';
import { cardValue, searchCards } from '@/components/about/headerSearch';
import { RecordGate } from '@/components/frame/RecordGate';
import { Button } from '@/components/ui/Button';
import { EmptyState } from '@/components/ui/EmptyState';
import { Field } from '@/components/ui/Field';
import { Panel } from '@/components/ui/Panel';
import { SkeletonRows } from '@/components/ui/Skeleton';
import { Table, type Column } from '@/components/ui/Table';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { useWide } from '@/components/ui/useWide';
import { useCubeHeader } from '@/hooks/useCubes';

type Row = ReturnType<typeof searchCards>[number];

const keyword: Column<Row> = {
  key: 'keyword',
  label: 'Card',
  width: space(26),
  grow: 0,
  cell: ({ card }) => (
    <Text mono size="small">
      {card.keyword}
    </Text>
  ),
};
const value: Column<Row> = {
  key: 'value',
  label: 'Value',
  width: space(44),
  cell: ({ card }) => <Value text={cardValue(card)} />,
};
const comment: Column<Row> = {
  key: 'comment',
  label: 'Comment',
  width: space(72),
  grow: 2,
  cell: ({ card }) => <Comment text={card.comment} />,
};
/** On a phone the comment stands under the value. */
const both: Column<Row> = {
  key: 'value',
  label: 'Value and comment',
  width: space(56),
  cell: ({ card }) => (
    <View style={{ paddingVertical: space(1) }}>
      <Value text={cardValue(card)} />
      <Comment text={card.comment} />
    </View>
  ),
};

/** The header as the file has it, card by card. */
export function HeaderPanel({ cubeId }: { cubeId: string }) {
  const read = useCubeHeader(cubeId);
  const { wide } = useWide();
  const [text, setText] = useState('');
  return (
    <Panel flush title="Header">
      <View style={{ paddingHorizontal: space(4), paddingBottom: space(2) }}>
        <RecordGate
          read={read}
          what="header"
          skeleton={<SkeletonRows rows={6} height={36} label="Loading the header" />}
        >
          {({ cards }) => {
            const rows = searchCards(cards, text);
            return (
              <View style={{ gap: space(2) }}>
                <View style={{ maxWidth: space(90) }}>
                  <Field
                    label="Search the cards"
                    value={text}
                    onChangeText={setText}
                    autoCapitalize="none"
                    autoCorrect={false}
                  />
                </View>
                <Text size="small" tone="quiet" role="status">
                  {text.trim() === '' ? `${cards.length} cards` : `${rows.length} of ${cards.length} cards`}
                </Text>
                {rows.length > 0 ? (
                  <Table
                    dense
                    label="Header cards"
                    columns={wide ? [keyword, value, comment] : [keyword, both]}
                    rows={rows}
                    rowKey={({ index }) => String(index)}
                  />
                ) : (
                  <EmptyState
                    level={3}
                    icon="search"
                    title="No card says that"
                    action={<Button label="Show all cards" onPress={() => setText('')} />}
                  >
                    Keyword, value and comment are searched for every word.
                  </EmptyState>
                )}
              </View>
            );
          }}
        </RecordGate>
      </View>
    </Panel>
  );
}

const anywhere = { overflowWrap: 'anywhere' } as object;

const Value = ({ text }: { text: string }) =>
  text === '' ? null : (
    <Text mono size="small" selectable style={anywhere}>
      {text}
    </Text>
  );
const Comment = ({ text }: { text: string | null }) =>
  text ? (
    <Text size="small" tone="quiet" style={anywhere}>
      {text.trim()}
    </Text>
  ) : null;
