import { createContext, useCallback, useContext, useEffect, useState, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { radius, space, useTheme } from '@/components/theme';
import { Text } from './Text';

type Announce = (message: string) => void;

const Context = createContext<Announce | null>(null);

const shownForMs = 5000;

/** Holds the one polite live region of the app, and shows its words for a moment over the page. */
export function ToastProvider({ children }: { children: ReactNode }) {
  const [toast, setToast] = useState<{ message: string; turn: number } | null>(null);
  const announce = useCallback<Announce>((message) => setToast((before) => ({ message, turn: (before?.turn ?? 0) + 1 })), []);
  useEffect(() => {
    if (!toast) return;
    const timer = setTimeout(() => setToast(null), shownForMs);
    return () => clearTimeout(timer);
  }, [toast]);
  return (
    <Context.Provider value={announce}>
      {children}
      <View role="status" aria-live="polite" style={styles.place}>
        {toast ? <ToastCard key={toast.turn} message={toast.message} /> : null}
      </View>
    </Context.Provider>
  );
}

/** Says a short thing that happened ("Jar C seen"), to eyes and to screen readers. Never for errors that need an act. */
export function useAnnounce(): Announce {
  const announce = useContext(Context);
  if (!announce) throw new Error('useAnnounce needs a ToastProvider above it');
  return announce;
}

function ToastCard({ message }: { message: string }) {
  const { colors } = useTheme();
  return (
    <View style={[styles.card, { backgroundColor: colors.solid }]}>
      <Text tone="inherit" strong style={{ color: colors.onSolid }}>
        {message}
      </Text>
    </View>
  );
}

const styles = StyleSheet.create({
  place: { position: 'fixed', left: 0, right: 0, bottom: 84, alignItems: 'center', pointerEvents: 'none', paddingHorizontal: space.side },
  card: { borderRadius: radius.button, paddingHorizontal: space.lg, paddingVertical: space.md, maxWidth: 480 },
});
