import type { ReactNode } from 'react';
import { Text as NativeText, type TextProps as NativeProps, type TextStyle } from 'react-native';
import { useTheme } from './theme';
import { fonts, typeScale, type Colors, type TypeSize } from './tokens';

export interface TextProps extends Omit<NativeProps, 'style'> {
  size?: TypeSize;
  tone?: keyof Colors;
  weight?: 'regular' | 'semibold' | 'bold';
  /** Tabular figures, for every number. */
  mono?: boolean;
  /** Makes it a heading of this level. */
  heading?: 1 | 2 | 3 | 4;
  align?: 'left' | 'right' | 'center';
  style?: TextStyle | (TextStyle | undefined | false)[];
  children?: ReactNode;
}

const family = (mono: boolean, weight: NonNullable<TextProps['weight']>): string => {
  if (mono) return weight === 'regular' ? fonts.mono : fonts.monoSemibold;
  return fonts[weight];
};

export function Text({
  size = 'body',
  tone = 'text',
  weight = 'regular',
  mono = false,
  heading,
  align,
  style,
  ...rest
}: TextProps) {
  const { color } = useTheme();
  const [fontSize, lineHeight] = typeScale[size];
  return (
    <NativeText
      {...(heading ? { role: 'heading' as const, 'aria-level': heading } : null)}
      {...rest}
      style={[
        { fontFamily: family(mono, weight), fontSize, lineHeight, color: color[tone] },
        align && { textAlign: align },
        style as TextStyle,
      ]}
    />
  );
}

/** Heard, not seen. */
export function HiddenText({ children }: { children: string }) {
  const hidden = { position: 'absolute', width: 1, height: 1, overflow: 'hidden', clipPath: 'inset(50%)' };
  return <NativeText style={hidden as TextStyle}>{children}</NativeText>;
}

/** A lowered index, as in v with sys; put it inside a Text. */
export function Sub({ children, size = 'small', mono = false, tone }: TextProps) {
  const { color } = useTheme();
  const [fontSize] = typeScale[size];
  const lowered = { verticalAlign: 'sub' } as unknown as TextStyle;
  return (
    <NativeText
      style={[
        { fontFamily: family(mono, 'regular'), fontSize: fontSize - 1, lineHeight: fontSize },
        tone && { color: color[tone] },
        lowered,
      ]}
    >
      {children}
    </NativeText>
  );
}
