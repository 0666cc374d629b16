import { AtkinsonHyperlegibleNext_400Regular } from '@expo-google-fonts/atkinson-hyperlegible-next/400Regular';
import { AtkinsonHyperlegibleNext_700Bold } from '@expo-google-fonts/atkinson-hyperlegible-next/700Bold';
import { BricolageGrotesque_700Bold } from '@expo-google-fonts/bricolage-grotesque/700Bold';
import { SplineSansMono_400Regular } from '@expo-google-fonts/spline-sans-mono/400Regular';
import { SplineSansMono_600SemiBold } from '@expo-google-fonts/spline-sans-mono/600SemiBold';
import { FontDisplay, useFonts } from 'expo-font';

const files = {
  AtkinsonHyperlegibleNext_400Regular,
  AtkinsonHyperlegibleNext_700Bold,
  BricolageGrotesque_700Bold,
  SplineSansMono_400Regular,
  SplineSansMono_600SemiBold,
};

const sources = Object.fromEntries(
  Object.entries(files).map(([name, uri]) => [name, { uri, display: FontDisplay.SWAP }]),
);

/** Fetches the five shipped fonts. Nothing waits for them: text shows in the fallback and is swapped. */
export function useAppFonts(): void {
  useFonts(sources);
}
