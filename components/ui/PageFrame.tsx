import { usePathname } from 'expo-router';
import { useEffect, useRef, type ReactNode } from 'react';
import { ScrollView, StyleSheet, View, type Text as NativeText } from 'react-native';
import { size, space, useBreakpoints, useTheme } from '@/components/theme';
import { Icon } from './Icon';
import { LinkBox, type To } from './Link';
import { Heading, Mono, Text } from './Text';

export interface PageFrameProps {
  /** The page's one h1: says the state, not the category. */
  title: string;
  /** Tab title, where the heading alone would be unclear there. */
  documentTitle?: string;
  /** Small line above the heading: the kit's number, the group. */
  eyebrow?: string;
  /** One quiet sentence under the heading. */
  lead?: string;
  back?: { label: string; to: To };
  /** Beside the heading: an emblem, a badge. */
  beside?: ReactNode;
  children?: ReactNode;
  /** The screen's main action, pinned in thumb's reach on a phone, after the content when wide. */
  footer?: ReactNode;
  /** A second pane: at the right from 700 px, after the content on a phone. */
  aside?: ReactNode;
  asideLabel?: string;
  /** `column` for forms and reading, `wide` for tables. */
  width?: 'column' | 'wide';
  /** Dark all round, for scanning. */
  dark?: boolean;
}

/**
 * Frame of every screen: the main landmark, the heading, the tab title. After a navigation the focus moves to the
 * heading, which reads the new page's name aloud. Keep one frame mounted while a screen loads; change its title.
 */
export function PageFrame(props: PageFrameProps) {
  const { title, documentTitle, children, footer, aside, asideLabel, width = 'column', dark } = props;
  const t = useTheme();
  const { phone, wide } = useBreakpoints();
  const heading = usePageHeading(documentTitle ?? title);
  const body = (
    <View style={[styles.body, width === 'column' ? styles.column : styles.wide, { gap: space.lg }]}>
      <PageHead {...props} headingRef={heading} large={wide} />
      {children}
      {footer && !phone ? <View style={styles.footerWide}>{footer}</View> : null}
    </View>
  );
  return (
    <View style={[styles.panes, { backgroundColor: dark ? t.colors.field : t.colors.ground }]}>
      <View role="main" id="main" style={styles.main}>
        <ScrollView style={styles.scroll} contentContainerStyle={[styles.content, wide && styles.contentWide]}>
          {body}
          {aside && phone ? (
            <View role="complementary" aria-label={asideLabel ?? 'More'} style={[styles.body, styles.asideBelow]}>
              {aside}
            </View>
          ) : null}
        </ScrollView>
        {footer && phone ? <View style={[styles.footer, dark ? null : t.atoms.ruleTop, { backgroundColor: dark ? t.colors.field : t.colors.sheet }]}>{footer}</View> : null}
      </View>
      {aside && !phone ? (
        <View role="complementary" aria-label={asideLabel ?? 'More'} style={[styles.aside, t.atoms.sheetFlat, t.atoms.ruleLeft, { width: wide ? size.sidePane : 340 }]}>
          <ScrollView contentContainerStyle={styles.asideContent}>{aside}</ScrollView>
        </View>
      ) : null}
    </View>
  );
}

function PageHead({ title, eyebrow, lead, back, beside, dark, headingRef, large }: PageFrameProps & { headingRef: React.Ref<NativeText>; large: boolean }) {
  const { colors } = useTheme();
  return (
    <View style={styles.head}>
      {back ? (
        <LinkBox to={back.to} style={styles.back}>
          <Icon name="back" colour={dark ? colors.onField : colors.action} />
          <Text tone={dark ? 'onField' : 'action'}>{back.label}</Text>
        </LinkBox>
      ) : null}
      <View style={styles.headRow}>
        {beside}
        <View style={styles.headWords}>
          {eyebrow ? (
            <Mono size="quiet" tone={dark ? 'softOnField' : 'soft'}>
              {eyebrow}
            </Mono>
          ) : null}
          <Heading level={1} look={large ? 'display' : 'heading'} tone={dark ? 'onField' : 'ink'} focusable ref={headingRef}>
            {title}
          </Heading>
          {lead ? <Text tone={dark ? 'softOnField' : 'soft'}>{lead}</Text> : null}
        </View>
      </View>
    </View>
  );
}

/** The address last shown; the first page of a visit leaves the focus at the top, so that the skip link comes first. */
let lastPath: string | null = null;

function usePageHeading(documentTitle: string) {
  const pathname = usePathname();
  const heading = useRef<NativeText>(null);
  useEffect(() => {
    document.title = `${documentTitle} · Trayward`;
  }, [documentTitle]);
  useEffect(() => {
    const moved = lastPath !== null && (lastPath !== pathname || document.activeElement === document.body);
    lastPath = pathname;
    const element = heading.current as HTMLElement | null;
    if (moved) element?.focus({ preventScroll: true });
  }, [pathname]);
  return heading;
}

const styles = StyleSheet.create({
  panes: { flex: 1, flexDirection: 'row', minHeight: 0 },
  main: { flex: 1, minWidth: 0, minHeight: 0 },
  scroll: { flex: 1 },
  content: { padding: space.side, paddingBottom: space.xxl, gap: space.xl },
  contentWide: { padding: 26, paddingBottom: space.huge },
  body: { width: '100%' },
  column: { maxWidth: size.column },
  wide: { maxWidth: 1120 },
  head: { gap: space.xs },
  headRow: { flexDirection: 'row', gap: space.lg, alignItems: 'center' },
  headWords: { flex: 1, gap: space.xxs },
  back: { flexDirection: 'row', alignItems: 'center', alignSelf: 'flex-start', gap: space.sm, marginTop: -space.md },
  footer: { padding: space.side, paddingVertical: space.md, gap: space.sm },
  footerWide: { alignSelf: 'flex-start', minWidth: 320, maxWidth: '100%', gap: space.sm, marginTop: space.sm },
  aside: { flexShrink: 0 },
  asideContent: { padding: 22, gap: space.lg },
  asideBelow: { gap: space.lg },
});
