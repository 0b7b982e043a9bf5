import { View } from 'react-native';
import { Field } from '../ui/Field';
import { ParameterName } from '../ui/Quantity';
import { SegmentedChoice } from '../ui/SegmentedChoice';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { hairline, space } from '../ui/tokens';
import { MODES, type FitFormProblems, type Mode, type ParameterForm } from './fitForm';
import { unitOf, writtenName } from './parameterWords';

const labels: Record<Mode, string> = { free: 'Free', fixed: 'Fixed', bounds: 'Bounds', prior: 'Prior' };
type Box = 'value' | 'sd' | 'low' | 'high';
const boxes: Record<Mode, readonly Box[]> = {
  free: [],
  fixed: ['value'],
  bounds: ['low', 'high'],
  prior: ['value', 'sd', 'low', 'high'],
};

/** Short, for the row names the parameter and a group carries its name. */
const boxLabels: Record<Box, string> = { value: 'Mean', sd: 'Error', low: 'Lowest', high: 'Highest' };
const boxLabel = (mode: Mode, box: Box): string =>
  mode === 'fixed' && box === 'value' ? 'Held at' : boxLabels[box];

/** What is said of one parameter before the fit, with the boxes that its choice needs. */
export function ConstraintRow({
  name,
  form,
  onChange,
  problems,
}: {
  name: string;
  form: ParameterForm;
  onChange: (form: ParameterForm) => void;
  problems: FitFormProblems;
}) {
  const { color } = useTheme();
  const unit = unitOf(name);
  const whole = problems[name];
  return (
    <View
      role="group"
      aria-label={writtenName(name)}
      style={{
        gap: space(2),
        paddingVertical: space(2),
        borderTopWidth: hairline,
        borderTopColor: color.line,
      }}
    >
      <View
        style={{
          flexDirection: 'row',
          flexWrap: 'wrap',
          alignItems: 'center',
          justifyContent: 'space-between',
          gap: space(2),
        }}
      >
        <Text>
          <ParameterName name={name} long />
          {unit ? (
            <Text size="small" tone="quiet">
              {`  ${unit}`}
            </Text>
          ) : null}
        </Text>
        <SegmentedChoice<Mode>
          small
          hideLabel
          label={`What is known of ${writtenName(name)}`}
          value={form.mode}
          options={MODES.map((value) => ({ value, label: labels[value] }))}
          onChange={(mode) => onChange({ ...form, mode })}
        />
      </View>
      {boxes[form.mode].length > 0 && (
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2) }}>
          {boxes[form.mode].map((box) => (
            <View key={box} style={{ flexGrow: 1, flexBasis: space(30), minWidth: space(30) }}>
              <Field
                label={boxLabel(form.mode, box)}
                unit={unit || undefined}
                mono
                inputMode="text"
                placeholder={form.mode === 'prior' && (box === 'low' || box === 'high') ? 'none' : undefined}
                value={form[box]}
                onChangeText={(text) => onChange({ ...form, [box]: text })}
                problem={problems[`${name}.${box}`]}
              />
            </View>
          ))}
        </View>
      )}
      {whole && (
        <Text size="small" tone="error" role="alert">
          {whole}
        </Text>
      )}
    </View>
  );
}
