import { useState, type ReactNode } from 'react';
import { View, type ViewStyle } from 'react-native';

/** Gives its content the width it has, in px, for drawings; draws nothing until it is known. */
export function Measured({
  height,
  children,
  style,
}: {
  height: number;
  children: (width: number) => ReactNode;
  style?: ViewStyle;
}) {
  const [width, setWidth] = useState(0);
  return (
    <View
      style={[{ alignSelf: 'stretch', height }, style]}
      onLayout={(e) => setWidth(Math.floor(e.nativeEvent.layout.width))}
    >
      {width > 0 && children(width)}
    </View>
  );
}
