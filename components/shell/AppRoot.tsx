import { Slot } from 'expo-router';
import { ApiProvider, SessionProvider } from '@/components/api';
import { ThemeProvider } from '@/components/theme';
import { useAppFonts } from '@/components/theme/fonts';
import { ToastProvider } from '@/components/ui/Toast';

/** Everything every page needs: scheme, fonts, server, session, announcements. */
export function AppRoot() {
  useAppFonts();
  return (
    <ThemeProvider>
      <ApiProvider>
        <ToastProvider>
          <SessionProvider>
            <Slot />
          </SessionProvider>
        </ToastProvider>
      </ApiProvider>
    </ThemeProvider>
  );
}
