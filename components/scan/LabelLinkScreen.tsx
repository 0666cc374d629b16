import { useLocalSearchParams } from 'expo-router';
import { parseLabelCode } from '@shared/codes';
import { CodeText, LinkButton, Notice, PageFrame } from '@/components/ui';
import { codeFaults } from './codeFaults';
import { Scanned } from './Scanned';

/** Where a label's own link leads, opened by a phone's camera: the same as scanning it here. */
export function LabelLinkScreen() {
  const { code } = useLocalSearchParams<{ code: string }>();
  const reading = parseLabelCode(code);
  if ('reason' in reading) {
    return (
      <PageFrame title="That label cannot be read" documentTitle="Label">
        <Notice kind="error">{codeFaults[reading.reason]}</Notice>
        <LinkButton label="Scan it here" to="/scan" />
      </PageFrame>
    );
  }
  return (
    <PageFrame title="Label scanned" documentTitle="Label">
      <CodeText code={reading.code} />
      <Scanned code={reading.code} />
    </PageFrame>
  );
}
