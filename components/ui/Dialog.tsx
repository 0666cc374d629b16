import { useEffect, useId, useRef, type ReactNode } from 'react';
import { View } from 'react-native';
import { radius, space, useTheme } from '@/components/theme';
import { Button } from './Button';
import { Heading } from './Text';

export interface DialogProps {
  open: boolean;
  onClose: () => void;
  title: string;
  children?: ReactNode;
  /** Main action; it stands above the closing button. */
  action?: ReactNode;
  closeLabel?: string;
}

/**
 * The browser's own modal dialog: it keeps the focus inside, closes on Escape, makes the page behind inert and gives
 * the focus back to what opened it.
 */
export function Dialog({ open, onClose, title, children, action, closeLabel = 'Close' }: DialogProps) {
  const { colors } = useTheme();
  const dialog = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const element = dialog.current;
    if (!element) return;
    if (open && !element.open) element.showModal();
    if (!open && element.open) element.close();
  }, [open]);
  return (
    <dialog
      ref={dialog}
      aria-labelledby={titleId}
      onClose={onClose}
      onClick={(event) => {
        if (event.target === dialog.current) onClose();
      }}
      style={{
        padding: 0,
        border: `1px solid ${colors.rule}`,
        borderRadius: radius.sheet,
        backgroundColor: colors.sheet,
        color: colors.ink,
        width: 'min(440px, calc(100vw - 28px))',
        maxHeight: 'calc(100dvh - 28px)',
        overflow: 'auto',
      }}
    >
      {open ? (
        <View style={{ padding: space.side, gap: space.lg }}>
          <Heading id={titleId} level={2} look="heading">
            {title}
          </Heading>
          {children}
          <View style={{ gap: space.sm }}>
            {action}
            <Button kind="secondary" label={closeLabel} onPress={onClose} />
          </View>
        </View>
      ) : null}
    </dialog>
  );
}
