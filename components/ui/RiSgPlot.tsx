import { scaleLinear } from 'd3-scale';
import { useState } from 'react';
import { StyleSheet, View, type LayoutChangeEvent } from 'react-native';
import Svg, { Ellipse, G, Line, Rect, Text as SvgText } from 'react-native-svg';
import { family, space, useTheme, type Colors } from '@/components/theme';
import { formatMeasured } from './format';
import { Button } from './Button';
import { StatTable } from './StatTable';

export interface Measured {
  value: number;
  /** Standard uncertainty, k = 1. */
  u: number;
}

/** A point of the plot; the refractive index or the specific gravity may be missing, and is then drawn as a band. */
export interface PlotPoint {
  ri?: Measured | null;
  sg?: Measured | null;
}

export interface SpeciesBox {
  name: string;
  ri: readonly [number, number];
  sg: readonly [number, number];
}

export interface RiSgPlotProps {
  record: PlotPoint | null;
  reading: PlotPoint | null;
  /** The likely species, likeliest first; at most four are drawn. */
  species: readonly SpeciesBox[];
  height?: number;
}

const margin = { left: 44, right: 14, top: 14, bottom: 32 };

/** Refractive index against specific gravity: the record, the reading and where the likely species lie. Ellipses are ±2 u. */
export function RiSgPlot({ record, reading, species, height = 230 }: RiSgPlotProps) {
  const { colors } = useTheme();
  const [width, setWidth] = useState(320);
  const [asTable, setAsTable] = useState(false);
  const boxes = species.slice(0, 4);
  return (
    <View style={styles.frame} onLayout={(event: LayoutChangeEvent) => setWidth(Math.max(240, event.nativeEvent.layout.width))}>
      {asTable ? (
        <StatTable caption="Refractive index and specific gravity" head={['', 'RI', 'SG']} rows={tableRows(record, reading, boxes)} />
      ) : (
        <View role="img" aria-label={summary(record, reading, boxes)}>
          <Svg width={width} height={height}>
            <PlotBody {...{ record, reading, boxes, width, height, colors }} />
          </Svg>
        </View>
      )}
      <Button kind="quiet" label={asTable ? 'Show as a picture' : 'Show as a table'} onPress={() => setAsTable(!asTable)} style={styles.toggle} />
    </View>
  );
}

interface BodyProps {
  record: PlotPoint | null;
  reading: PlotPoint | null;
  boxes: readonly SpeciesBox[];
  width: number;
  height: number;
  colors: Colors;
}

function PlotBody({ record, reading, boxes, width, height, colors }: BodyProps) {
  const x = scaleLinear(extent(boxes.map((box) => box.ri), [record?.ri, reading?.ri], 0.02), [margin.left, width - margin.right]).nice(4);
  const y = scaleLinear(extent(boxes.map((box) => box.sg), [record?.sg, reading?.sg], 0.1), [height - margin.bottom, margin.top]).nice(4);
  const place = { x, y };
  return (
    <G>
      <Axes {...place} width={width} height={height} colors={colors} />
      {boxes.map((box, index) => (
        <G key={box.name}>
          <Rect
            transform={`translate(${x(box.ri[0]) - 2}, ${y(box.sg[1]) - 2})`}
            width={x(box.ri[1]) - x(box.ri[0]) + 4}
            height={y(box.sg[0]) - y(box.sg[1]) + 4}
            rx={5}
            fill={colors.actionGround}
            fillOpacity={index === 0 ? 0.9 : 0.45}
            stroke={colors.action}
            strokeDasharray="4 3"
          />
          <Caption x={x(box.ri[0])} y={y(box.sg[1]) - 7} colour={colors.action} words={box.name} width={width} />
        </G>
      ))}
      <Point point={record} {...place} colour={colors.same} shape="record" words="record" width={width} />
      <Point point={reading} {...place} colour={colors.different} shape="reading" words="reading" width={width} />
    </G>
  );
}

type Scale = ReturnType<typeof scaleLinear<number, number>>;

function Axes({ x, y, width, height, colors }: { x: Scale; y: Scale; width: number; height: number; colors: Colors }) {
  const bottom = height - margin.bottom;
  return (
    <G>
      <Line x1={margin.left} x2={width - margin.right} y1={bottom} y2={bottom} stroke={colors.ink} />
      <Line x1={margin.left} x2={margin.left} y1={margin.top} y2={bottom} stroke={colors.ink} />
      {x.ticks(4).map((tick) => (
        <Caption key={tick} x={x(tick)} y={bottom + 16} colour={colors.soft} words={tick.toFixed(2)} anchor="middle" mono />
      ))}
      {y.ticks(4).map((tick) => (
        <Caption key={tick} x={margin.left - 6} y={y(tick) + 4} colour={colors.soft} words={tick.toFixed(1)} anchor="end" mono />
      ))}
      <Caption x={width - margin.right} y={height - 3} colour={colors.ink} words="refractive index" anchor="end" />
      <Caption x={margin.left + 8} y={margin.top + 8} colour={colors.ink} words="SG" />
    </G>
  );
}

interface PointProps {
  point: PlotPoint | null;
  x: Scale;
  y: Scale;
  colour: string;
  shape: 'record' | 'reading';
  words: string;
  width: number;
}

/** ±2 u as an ellipse; where one of the two is unknown, a line across the plot at the other. */
function Point({ point, x, y, colour, shape, words, width }: PointProps) {
  const { ri, sg } = point ?? {};
  const dash = shape === 'record' ? {} : { strokeDasharray: '2 2' };
  if (ri && sg) {
    const [cx, cy] = [x(ri.value), y(sg.value)];
    const [rx, ry] = [Math.max(6, x(ri.value + 2 * ri.u) - cx), Math.max(6, cy - y(sg.value + 2 * sg.u))];
    return (
      <G>
        <Ellipse cx={cx} cy={cy} rx={rx} ry={ry} fill={colour} fillOpacity={0.18} stroke={colour} strokeWidth={1.5} {...dash} />
        {shape === 'record' ? <Ellipse cx={cx} cy={cy} rx={3} ry={3} fill={colour} /> : <Rect transform={`translate(${cx - 3}, ${cy - 3})`} width={6} height={6} fill={colour} />}
        <Caption x={cx + rx + 4} y={cy + 4} colour={colour} words={words} width={width} />
      </G>
    );
  }
  if (ri) {
    const [low, high] = y.range() as [number, number];
    return (
      <G>
        <Line x1={x(ri.value)} x2={x(ri.value)} y1={low} y2={high} stroke={colour} strokeWidth={2} {...dash} />
        <Caption x={x(ri.value) + 5} y={shape === 'record' ? high + 10 : high + 24} colour={colour} words={`${words}, no SG`} width={width} />
      </G>
    );
  }
  if (sg) {
    const [low, high] = x.range() as [number, number];
    return (
      <G>
        <Line x1={low} x2={high} y1={y(sg.value)} y2={y(sg.value)} stroke={colour} strokeWidth={2} {...dash} />
        <Caption x={low + 6} y={y(sg.value) - 5} colour={colour} words={`${words}, no RI`} width={width} />
      </G>
    );
  }
  return null;
}

interface CaptionProps {
  x: number;
  y: number;
  colour: string;
  words: string;
  anchor?: 'start' | 'middle' | 'end';
  mono?: boolean;
  /** Width of the plot: words that would leave it turn to the other side. */
  width?: number;
}

function Caption({ x, y, colour, words, anchor = 'start', mono = false, width }: CaptionProps) {
  const leaves = anchor === 'start' && width !== undefined && x + words.length * 6.6 > width;
  return (
    <SvgText transform={`translate(${leaves ? width - 4 : x}, ${y})`} fill={colour} fontSize={12} fontFamily={mono ? family.mono : family.text} textAnchor={leaves ? 'end' : anchor}>
      {words}
    </SvgText>
  );
}

function extent(ranges: readonly (readonly [number, number])[], points: readonly (Measured | null | undefined)[], pad: number): [number, number] {
  const values = [...ranges.flat(), ...points.flatMap((point) => (point ? [point.value - 2 * point.u, point.value + 2 * point.u] : []))];
  if (values.length === 0) return [1.4, 1.8];
  return [Math.min(...values) - pad, Math.max(...values) + pad];
}

function tableRows(record: PlotPoint | null, reading: PlotPoint | null, boxes: readonly SpeciesBox[]): string[][] {
  const cells = (point: PlotPoint | null) => [point?.ri, point?.sg].map((each) => formatMeasured({ value: each?.value, u: each?.u }));
  return [
    ['record', ...cells(record)],
    ['reading', ...cells(reading)],
    ...boxes.map((box) => [box.name, box.ri.map((n) => n.toFixed(3)).join('–'), box.sg.map((n) => n.toFixed(2)).join('–')]),
  ];
}

function summary(record: PlotPoint | null, reading: PlotPoint | null, boxes: readonly SpeciesBox[]): string {
  const rows = tableRows(record, reading, boxes).map(([name, ri, sg]) => `${name}: RI ${ri}, SG ${sg}`);
  return `Plot of refractive index against specific gravity. ${rows.join('. ')}.`;
}

const styles = StyleSheet.create({
  frame: { gap: space.xs },
  toggle: { alignSelf: 'flex-start', paddingHorizontal: 0 },
});
