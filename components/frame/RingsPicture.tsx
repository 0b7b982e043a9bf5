import { View } from 'react-native';
import Svg, { Circle, Path } from 'react-native-svg';
import { useTheme } from '../ui/theme';

const velocities = [-0.96, -0.8, -0.5, -0.2, 0.2, 0.5, 0.8, 0.96];
/** Marks of the picture: position angle on the ring (degrees) and a small offset outward. */
const marks = [
  [2, 20, 0.6],
  [2, 110, -0.8],
  [3, 160, 0.5],
  [3, 300, 0.9],
  [4, 60, -0.5],
  [4, 250, 0.7],
  [5, 340, -0.7],
  [5, 200, 0.4],
] as const;

/** The rings of one shell across its channels, by the formula of the product: sin θ = sin Θ √(1 − u²). */
export function RingsPicture() {
  const { color } = useTheme();
  const ring = (u: number) => 44 * Math.sqrt(1 - u * u);
  const x = (i: number) => 60 + i * 51.5;
  return (
    <View aria-hidden>
      <Svg width="100%" height={112} viewBox="0 0 480 112" fill="none">
        {velocities.map((u, i) => (
          <Circle
            key={u}
            cx={x(i)}
            cy={54}
            r={ring(u)}
            stroke={color.model}
            strokeWidth={1.25}
            opacity={0.35 + 0.65 * (1 - u * u)}
          />
        ))}
        {marks.map(([i, angle, off], k) => {
          const r = ring(velocities[i]!) + off;
          const a = (angle * Math.PI) / 180;
          return (
            <Circle key={k} cx={x(i) + r * Math.cos(a)} cy={54 + r * Math.sin(a)} r={3} fill={color.person} />
          );
        })}
        <Path d="M16 106h448" stroke={color.line} strokeWidth={1} />
        {velocities.map((u, i) => (
          <Path key={u} d={`M${x(i)} 103v6`} stroke={color.control} strokeWidth={1} />
        ))}
      </Svg>
    </View>
  );
}
