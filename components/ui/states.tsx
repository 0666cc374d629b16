import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { space } from '@/components/theme';
import { problemWords } from '@/components/api/words';
import { Button } from './Button';
import { InterferenceStrip } from './InterferenceStrip';
import { Notice } from './Notice';
import { Heading, Text } from './Text';

/** Something is on its way. Announced politely; quiet enough not to flash on a fast answer. */
export function Loading({ label = 'Loading' }: { label?: string }) {
  return (
    <View role="status" aria-label={label} style={styles.centre}>
      <View style={styles.strip}>
        <InterferenceStrip height={6} />
      </View>
      <Text tone="soft" size="quiet">
        {label} …
      </Text>
    </View>
  );
}

/** Nothing here yet, and what to do about it. */
export function EmptyState({ title, children, action }: { title: string; children?: ReactNode; action?: ReactNode }) {
  return (
    <View style={styles.empty}>
      <Heading level={2}>{title}</Heading>
      {typeof children === 'string' ? <Text tone="soft">{children}</Text> : children}
      {action ? <View style={styles.action}>{action}</View> : null}
    </View>
  );
}

/** An answer that did not come or was a refusal, in words, with a way to try again. */
export function Failed({ error, onRetry, title }: { error: unknown; onRetry?: () => void; title?: string }) {
  const words = problemWords(error);
  return (
    <View style={styles.failed}>
      <Notice kind="error" title={title ?? words.title}>
        <Text size="quiet">{words.text}</Text>
      </Notice>
      {onRetry ? <Button kind="secondary" label="Try again" onPress={onRetry} /> : null}
    </View>
  );
}

const styles = StyleSheet.create({
  centre: { alignItems: 'center', gap: space.md, paddingVertical: space.xxl },
  strip: { width: 120 },
  empty: { gap: space.sm, paddingVertical: space.xl, maxWidth: 520 },
  action: { marginTop: space.sm, alignSelf: 'flex-start' },
  failed: { gap: space.md, maxWidth: 600 },
});
