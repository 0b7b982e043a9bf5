import { useEffect, useRef, useState } from 'react';
import { View } from 'react-native';
import type { GuideStep } from '@/components/guide/guideSteps';
import { placeCard, type Box } from '@/components/guide/placeCard';
import { useTarget } from '@/components/guide/useTarget';
import { Button, IconButton } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { hairline, radius, space } from '@/components/ui/tokens';
import { useWide } from '@/components/ui/useWide';

const WIDTH = 320;
const AROUND = 4;
const fixed = 'fixed' as 'absolute';

/** One card beside the control it speaks of, with a frame around that; the page below stays live. */
export function GuideCard({
  step,
  number,
  of,
  onStep,
  onClose,
}: {
  step: GuideStep;
  /** From 1. */
  number: number;
  of: number;
  onStep: (by: 1 | -1) => void;
  onClose: () => void;
}) {
  const { color } = useTheme();
  const page = useWide();
  const target = useTarget(step.at);
  const [height, setHeight] = useState(200);
  const card = useRef<View>(null);
  const width = Math.min(WIDTH, page.width - space(6));
  const middle = { left: page.width / 2, top: page.height / 2, width: 0, height: 0 };
  const at = placeCard(target ?? middle, { width, height }, page);
  useEffect(() => {
    (card.current as unknown as HTMLElement | null)?.focus({ preventScroll: true });
  }, [number]);
  const keys = {
    onKeyDown: (e: { key: string; stopPropagation(): void }) => {
      if (e.key !== 'Escape') return;
      e.stopPropagation();
      onClose();
    },
  } as object;
  return (
    <>
      {target && <Frame box={target} colour={color.person} />}
      <View
        ref={card}
        role="dialog"
        aria-label={`${step.title}, card ${number} of ${of}`}
        tabIndex={-1}
        {...keys}
        onLayout={(e) => setHeight(e.nativeEvent.layout.height)}
        style={{
          position: fixed,
          ...at,
          width,
          zIndex: 60,
          gap: space(2),
          padding: space(4),
          borderRadius: radius.large,
          borderWidth: hairline,
          borderColor: color.control,
          backgroundColor: color.raised,
          boxShadow: `0 ${space(1)}px ${space(6)}px ${color.shadow}`,
        }}
      >
        <View style={{ flexDirection: 'row', alignItems: 'center' }}>
          <Text size="lead" weight="bold" heading={2} style={{ flex: 1 }}>
            {step.title}
          </Text>
          <IconButton icon="close" label="Close the guide" onPress={onClose} size={16} />
        </View>
        <Text>{step.text}</Text>
        <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(2) }}>
          <Text size="small" tone="quiet" mono style={{ flex: 1 }}>
            {`${number} of ${of}`}
          </Text>
          {number > 1 && <Button kind="quiet" label="Back" onPress={() => onStep(-1)} />}
          <Button
            kind="primary"
            label={number === of ? 'Done' : 'Next'}
            onPress={() => (number === of ? onClose() : onStep(1))}
          />
        </View>
      </View>
    </>
  );
}

function Frame({ box, colour }: { box: Box; colour: string }) {
  return (
    <View
      aria-hidden
      pointerEvents="none"
      style={{
        position: fixed,
        left: box.left - AROUND,
        top: box.top - AROUND,
        width: box.width + 2 * AROUND,
        height: box.height + 2 * AROUND,
        zIndex: 59,
        borderRadius: radius.small,
        borderWidth: space(0.75),
        borderColor: colour,
      }}
    />
  );
}
