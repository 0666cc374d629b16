import { router, type Href } from 'expo-router';
import { useState, type MouseEvent, type ReactNode } from 'react';
import { StyleSheet, Text as NativeText, View, type StyleProp, type TextStyle, type ViewStyle } from 'react-native';
import { a, size, useTheme } from '@/components/theme';
import { ButtonFace, buttonShape, type ButtonLook } from './Button';

/** An address inside the app, as a string. */
export type To = Extract<Href, string>;

interface Target {
  to: To;
  /** Takes the place of the present page in the history. */
  replace?: boolean;
}

interface External {
  /** An address that the browser itself opens: a PDF, a mail address, another site. */
  external: string;
  newTab?: boolean;
}

/**
 * Links are real anchors: they can be opened in a new tab and follow Enter. A Pressable with the role of a link
 * does neither (react-native-web issue 2681).
 */
export interface LinkBoxProps extends Target {
  label?: string;
  current?: boolean;
  children: ReactNode;
  style?: StyleProp<ViewStyle>;
  hoverStyle?: StyleProp<ViewStyle>;
}

/** A whole row or card that is a link. Its words are its name unless `label` is given. */
export function LinkBox({ to, replace, label, current, children, style, hoverStyle }: LinkBoxProps) {
  const [hovered, setHovered] = useState(false);
  return (
    <View
      href={to}
      onClick={(event) => follow(event, { to, ...(replace ? { replace } : {}) })}
      onMouseEnter={() => setHovered(true)}
      onMouseLeave={() => setHovered(false)}
      {...(label ? { 'aria-label': label } : {})}
      {...(current ? { 'aria-current': 'page' as const } : {})}
      style={[styles.box, style, hovered && hoverStyle]}
    >
      {children}
    </View>
  );
}

export type LinkButtonProps = ButtonLook & (Target | External);

/** Looks like a button, is a link: use it for every navigation. */
export function LinkButton(props: LinkButtonProps) {
  const { label, kind = 'secondary', icon, style } = props;
  const { colors } = useTheme();
  return (
    <View {...anchorProps(props)} style={[styles.box, buttonShape(kind, colors), style]}>
      <ButtonFace label={label} kind={kind} icon={icon} />
    </View>
  );
}

export type LinkProps = { label: string; size?: 'text' | 'quiet'; strong?: boolean; style?: StyleProp<TextStyle> } & (Target | External);

/** A link of words. Alone on its line it is 44 px high. */
export function Link(props: LinkProps) {
  const { label, size: textSize = 'text', strong, style } = props;
  const { colors } = useTheme();
  return (
    <View {...anchorProps(props)} style={styles.textBox}>
      <NativeText style={[textSize === 'text' ? a.textText : a.textQuiet, strong && a.strong, styles.words, { color: colors.action }, style]}>
        {label}
      </NativeText>
    </View>
  );
}

function anchorProps(target: Target | External) {
  if ('external' in target) {
    return {
      href: target.external,
      ...(target.newTab ? { hrefAttrs: { target: '_blank', rel: 'noopener' } } : {}),
    };
  }
  return { href: target.to, onClick: (event: MouseEvent<HTMLElement>) => follow(event, target) };
}

/** A plain click stays in the app; a click with a modifier or another button is the browser's. */
function follow(event: MouseEvent<HTMLElement>, { to, replace }: Target): void {
  if (event.defaultPrevented || event.button !== 0 || event.metaKey || event.ctrlKey || event.shiftKey || event.altKey) return;
  event.preventDefault();
  if (replace) router.replace(to);
  else router.push(to);
}

const styles = StyleSheet.create({
  box: { minHeight: size.target, textDecorationLine: 'none' } as ViewStyle,
  textBox: { minHeight: size.target, justifyContent: 'center', alignSelf: 'flex-start' },
  words: { textDecorationLine: 'underline' },
});
