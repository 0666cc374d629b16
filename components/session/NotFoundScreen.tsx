import { PublicShell } from '@/components/shell/PublicShell';
import { LinkButton } from '@/components/ui/Link';
import { PageFrame } from '@/components/ui/PageFrame';
import { Text } from '@/components/ui/Text';

export function NotFoundScreen() {
  return (
    <PublicShell>
      <PageFrame title="There is no page at this address">
        <Text>The link may be old or mistyped. If it came from a label, type the label’s code instead: it is printed beside the square.</Text>
        <LinkButton kind="primary" label="Go to your start page" to="/" replace />
      </PageFrame>
    </PublicShell>
  );
}
