import Svg, { Path } from 'react-native-svg';

/** Small drawings on a 16 × 16 grid. They always stand beside words and say nothing of their own to a screen reader. */
const paths = {
  check: 'M3 8.5 L6.5 12 L13 4.5',
  cross: 'M4 4 L12 12 M12 4 L4 12',
  arrow: 'M3 8 H13 M9 4 L13 8 L9 12',
  back: 'M13 8 H3 M7 4 L3 8 L7 12',
  chevron: 'M6 3.5 L10.5 8 L6 12.5',
  down: 'M3.5 6 L8 10.5 L12.5 6',
  dot: 'M8 8 h0.01',
  plus: 'M8 3 V13 M3 8 H13',
  caution: 'M8 2.5 L14.5 13.5 H1.5 Z M8 6.5 V9.5 M8 11.5 h0.01',
  info: 'M8 7.5 V12 M8 4.5 h0.01',
  erase: 'M6 3.5 H14 V12.5 H6 L1.5 8 Z M8 6 L12 10 M12 6 L8 10',
} as const;

export type IconName = keyof typeof paths | 'half';

export function Icon({ name, colour, size = 16, weight = 2 }: { name: IconName; colour: string; size?: number; weight?: number }) {
  return (
    <Svg width={size} height={size} viewBox="0 0 16 16" aria-hidden>
      {name === 'half' ? (
        <>
          <Path d="M8 2 A6 6 0 0 0 8 14 Z" fill={colour} />
          <Path d="M8 2 A6 6 0 1 1 8 14 A6 6 0 1 1 8 2" fill="none" stroke={colour} strokeWidth={weight * 0.8} />
        </>
      ) : (
        <Path
          d={paths[name]}
          fill="none"
          stroke={colour}
          strokeWidth={name === 'dot' ? weight * 3 : weight}
          strokeLinecap="round"
          strokeLinejoin="round"
        />
      )}
    </Svg>
  );
}
