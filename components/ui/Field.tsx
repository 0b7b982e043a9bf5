import { useId, useState } from 'react';
import { TextInput, View, type TextInputProps, type TextStyle } from 'react-native';
import { Text } from './Text';
import { useTheme } from './theme';
import { fonts, hairline, radius, space, touch, typeScale } from './tokens';

export interface FieldProps extends Omit<TextInputProps, 'style' | 'placeholderTextColor'> {
  label: string;
  /** Said below the label: what to write, in which unit. */
  hint?: string;
  /** What is wrong with the content and what to do; shown and read out with the field. */
  problem?: string | null;
  unit?: string;
  /** The label is heard, not seen. */
  hideLabel?: boolean;
  mono?: boolean;
}

/** A text field with its label, hint, unit and problem. */
export function Field({ label, hint, problem, unit, hideLabel, mono, multiline, ...rest }: FieldProps) {
  const { color } = useTheme();
  const [focused, setFocused] = useState(false);
  const id = useId();
  const [fontSize, lineHeight] = typeScale.lead;
  const described = [hint && `${id}-hint`, problem && `${id}-problem`].filter(Boolean).join(' ');
  const aria = {
    'aria-describedby': described || undefined,
    'aria-invalid': problem ? true : undefined,
  } as object;
  return (
    <View style={{ gap: space(1), alignSelf: 'stretch' }}>
      {!hideLabel && (
        <Text size="small" tone="quiet" weight="semibold" nativeID={`${id}-label`}>
          {label}
          {unit ? `, ${unit}` : ''}
        </Text>
      )}
      <TextInput
        {...rest}
        {...aria}
        multiline={multiline}
        aria-label={unit ? `${label}, ${unit}` : label}
        placeholderTextColor={color.quiet}
        onFocus={(e) => {
          setFocused(true);
          rest.onFocus?.(e);
        }}
        onBlur={(e) => {
          setFocused(false);
          rest.onBlur?.(e);
        }}
        style={
          {
            minHeight: multiline ? touch * 2 : touch,
            paddingHorizontal: space(3),
            paddingVertical: space(2),
            borderWidth: hairline,
            borderRadius: radius.small,
            borderColor: problem ? color.error : focused ? color.focus : color.control,
            backgroundColor: color.raised,
            color: color.text,
            fontFamily: mono ? fonts.mono : fonts.regular,
            fontSize,
            lineHeight,
          } as TextStyle
        }
      />
      {hint ? (
        <Text size="small" tone="quiet" nativeID={`${id}-hint`}>
          {hint}
        </Text>
      ) : null}
      {problem ? (
        <Text size="small" tone="error" role="alert" nativeID={`${id}-problem`}>
          {problem}
        </Text>
      ) : null}
    </View>
  );
}
