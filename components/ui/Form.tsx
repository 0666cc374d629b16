import { createContext, useContext, useRef, type ReactNode } from 'react';
import { space, type Space } from '@/components/theme';

const SubmitContext = createContext<(() => void) | null>(null);

export interface FormProps {
  /** Named for screen readers when a page has more than one form. */
  label?: string;
  onSubmit: () => void;
  gap?: Space;
  children?: ReactNode;
}

/**
 * A real form: Enter in a field sends it, and so does a `<Button submits …>` inside.
 * The browser's own validation bubbles are off; fields say what is wrong themselves.
 */
export function Form({ label, onSubmit, gap = 'lg', children }: FormProps) {
  const form = useRef<HTMLFormElement>(null);
  return (
    <form
      ref={form}
      noValidate
      aria-label={label}
      style={{ display: 'flex', flexDirection: 'column', gap: space[gap] }}
      onSubmit={(event) => {
        event.preventDefault();
        event.stopPropagation();
        onSubmit();
      }}
    >
      <SubmitContext.Provider value={() => form.current?.requestSubmit()}>{children}</SubmitContext.Provider>
      {/* Browsers send a form of several fields on Enter only if it holds a submit button of their own. */}
      <input type="submit" hidden tabIndex={-1} aria-hidden="true" />
    </form>
  );
}

/** Sends the form around the caller; does nothing where there is none. */
export function useFormSubmit(): () => void {
  return useContext(SubmitContext) ?? noForm;
}

function noForm(): void {}
