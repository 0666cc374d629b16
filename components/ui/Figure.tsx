import { useEffect, useRef } from 'react';
import { StyleSheet, View } from 'react-native';
import { computeFigure, type FigureParameters } from '@shared/gem/figure';
import { useTheme } from '@/components/theme';

export interface FigureProps {
  /** Null: a plain black disc, for those who may not know yet. */
  parameters: FigureParameters | null;
  /** Side in CSS pixels. */
  size?: number;
  /** What it shows, where no name stands beside it; without one it is decoration. */
  label?: string;
}

/** A stone's emblem: its interference picture between crossed polars, computed here. */
export function Figure({ parameters, size = 64, label }: FigureProps) {
  const { colors } = useTheme();
  const named = label ? { role: 'img' as const, 'aria-label': label } : { 'aria-hidden': true };
  return (
    <View {...named} style={[styles.disc, { width: size, height: size, borderRadius: size / 2, backgroundColor: colors.field, borderColor: colors.rule }]}>
      {parameters ? <FigureCanvas parameters={parameters} size={size} /> : null}
    </View>
  );
}

function FigureCanvas({ parameters, size }: { parameters: FigureParameters; size: number }) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const pixels = Math.round(size * Math.min(2, globalThis.devicePixelRatio || 1));
  useEffect(() => {
    const context = canvas.current?.getContext('2d');
    context?.putImageData(pictureOf(parameters, pixels), 0, 0);
  }, [parameters, pixels]);
  return <canvas ref={canvas} width={pixels} height={pixels} style={{ display: 'block', width: size, height: size }} />;
}

/** Pictures already computed, oldest first; a screen shows some eight, a kit list some forty. */
const pictures = new Map<string, ImageData>();
const mostPictures = 60;

function pictureOf(parameters: FigureParameters, pixels: number): ImageData {
  const key = `${pixels} ${JSON.stringify(parameters)}`;
  const known = pictures.get(key);
  if (known) return known;
  const picture = new ImageData(pixels, pixels);
  picture.data.set(computeFigure(parameters, pixels));
  if (pictures.size >= mostPictures) pictures.delete(pictures.keys().next().value ?? '');
  pictures.set(key, picture);
  return picture;
}

const styles = StyleSheet.create({
  disc: { overflow: 'hidden', flexShrink: 0 },
});
