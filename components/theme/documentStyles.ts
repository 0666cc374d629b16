import type { Theme } from './themes';

const elementId = 'trayward-document-styles';

/**
 * Rules that inline styles cannot express: the page's ground, the focus ring, reduced motion.
 * They are inserted through the style sheet's own interface, which a content security policy allows.
 */
export function applyDocumentStyles({ name, colors }: Theme): void {
  if (typeof document === 'undefined') return;
  const sheet = ownSheet();
  if (!sheet) return;
  while (sheet.cssRules.length > 0) sheet.deleteRule(0);
  const rules = [
    `html { background-color: ${colors.ground}; }`,
    `:root { color-scheme: ${name}; }`,
    `body { background-color: ${colors.ground}; color: ${colors.ink}; }`,
    // The ring has two tones, so that it is seen on light, dark and coloured grounds alike.
    `:focus-visible { outline: 3px solid ${colors.action} !important; outline-offset: 2px !important; box-shadow: 0 0 0 2px ${colors.sheet} !important; }`,
    `h1:focus-visible, main:focus-visible { outline: none !important; box-shadow: none !important; }`,
    `dialog::backdrop { background-color: ${colors.veil}; }`,
    `label:has(input:focus-visible) { outline: 3px solid ${colors.action}; outline-offset: 2px; border-radius: 8px; }`,
    `::selection { background-color: ${colors.action}; color: ${colors.sheet}; }`,
    `@media (prefers-reduced-motion: reduce) { * { transition-duration: 0.01ms !important; animation-duration: 0.01ms !important; animation-iteration-count: 1 !important; scroll-behavior: auto !important; } }`,
    `@media (forced-colors: active) { :focus-visible { outline-color: Highlight !important; } }`,
  ];
  rules.forEach((rule, index) => sheet.insertRule(rule, index));
  setThemeColour(colors.ground);
}

function ownSheet(): CSSStyleSheet | null {
  let element = document.getElementById(elementId);
  if (!(element instanceof HTMLStyleElement)) {
    element = document.createElement('style');
    element.id = elementId;
    document.head.appendChild(element);
  }
  return (element as HTMLStyleElement).sheet;
}

function setThemeColour(colour: string): void {
  let meta = document.querySelector<HTMLMetaElement>('meta[name="theme-color"]');
  if (!meta) {
    meta = document.createElement('meta');
    meta.name = 'theme-color';
    document.head.appendChild(meta);
  }
  meta.content = colour;
}
