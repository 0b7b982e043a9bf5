import { useEffect, useState } from 'react';
import { View } from 'react-native';
import { brightness } from '@/components/cube/words';
import { Field } from '@/components/ui/Field';
import { space } from '@/components/ui/tokens';

/** The lowest and the highest level of contours, by number. */
export function LevelFields({
  ends,
  onChange,
}: {
  ends: readonly [number, number];
  onChange: (ends: [number, number]) => void;
}) {
  return (
    <View style={{ flexDirection: 'row', gap: space(3) }}>
      {(['Lowest level', 'Highest level'] as const).map((label, end) => (
        <LevelField
          key={label}
          label={label}
          value={ends[end]!}
          fits={(v) => (end === 0 ? v < ends[1] : v > ends[0])}
          onChange={(v) => onChange(end === 0 ? [v, ends[1]] : [ends[0], v])}
        />
      ))}
    </View>
  );
}

function LevelField({
  label,
  value,
  fits,
  onChange,
}: {
  label: string;
  value: number;
  fits: (value: number) => boolean;
  onChange: (value: number) => void;
}) {
  const shown = brightness(value);
  const [text, setText] = useState(shown);
  const [wrong, setWrong] = useState(false);
  useEffect(() => {
    setText(shown);
    setWrong(false);
  }, [shown]);
  const take = () => {
    if (text === shown) return;
    const number = Number(text.replace('−', '-').replace(',', '.'));
    const holds = text.trim() !== '' && Number.isFinite(number) && fits(number);
    setWrong(!holds);
    if (holds) onChange(number);
  };
  return (
    <View style={{ flex: 1 }}>
      <Field
        label={label}
        mono
        inputMode="decimal"
        value={text}
        onChangeText={setText}
        onBlur={take}
        onSubmitEditing={take}
        problem={wrong ? 'A number, the lowest below the highest.' : null}
      />
    </View>
  );
}
