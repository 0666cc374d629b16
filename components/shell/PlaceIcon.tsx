import Svg, { Circle, Path } from 'react-native-svg';
import type { PlaceId } from './places';

/**
 * Tab drawings: a field of view with a mark in it. Chosen, the field is dark, as between crossed polars.
 * They stand beside their word and are hidden from screen readers.
 */
const marks: Record<PlaceId | 'more', string> = {
  desk: 'M8 9.5 H16 M8 12 H16 M8 14.5 H13',
  bench: 'M12 6.5 V17.5 M6.5 12 H17.5',
  borrow: 'M12 16.5 V8 M8.5 11 L12 7.5 L15.5 11',
  scan: 'M8 10 V8 H10 M14 8 H16 V10 M16 14 V16 H14 M10 16 H8 V14',
  kits: 'M9 9 h0.01 M15 9 h0.01 M9 15 h0.01 M15 15 h0.01',
  loans: 'M12 8 V12 L14.5 13.5',
  instruments: 'M8 15 A5.5 5.5 0 0 1 16 15 M12 15 L14.2 10.8',
  labels: 'M8 8 H11 V11 H8 Z M13.5 8.5 H16 M13.5 12 H16 M8 14 H11 M13.5 15.5 H16',
  people: 'M12 11 m-2.2 0 a2.2 2.2 0 1 0 4.4 0 a2.2 2.2 0 1 0 -4.4 0 M8 16.2 C9 14.2 15 14.2 16 16.2',
  money: 'M15 8.8 A4.3 4.3 0 1 0 15 15.2 M8 11 H12.5 M8 13 H12.5',
  settings: 'M8 9.5 H16 M8 14.5 H16 M10 8 V11 M14 13 V16',
  more: 'M8.5 12 h0.01 M12 12 h0.01 M15.5 12 h0.01',
};

export function PlaceIcon({ id, chosen, ink, ground, size = 26 }: { id: PlaceId | 'more'; chosen: boolean; ink: string; ground: string; size?: number }) {
  const dots = id === 'kits' || id === 'more';
  return (
    <Svg width={size} height={size} viewBox="0 0 24 24" aria-hidden>
      <Circle cx={12} cy={12} r={10} fill={chosen ? ink : 'none'} stroke={ink} strokeWidth={1.6} />
      <Path d={marks[id]} fill="none" stroke={chosen ? ground : ink} strokeWidth={dots ? 2.8 : 1.6} strokeLinecap="round" strokeLinejoin="round" />
    </Svg>
  );
}
