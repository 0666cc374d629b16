import { useState } from 'react';
import { PageFrame } from '@/components/ui';
import { Scanned } from './Scanned';
import { ScanPanel } from './ScanPanel';

/** Scan anything: a kit to take out or find, a jar to see where it belongs. */
export function ScanScreen() {
  const [code, setCode] = useState('');
  return (
    <PageFrame title="Scan a label" documentTitle="Scan" lead="The label of a kit, or of one stone’s jar.">
      <ScanPanel prompt="Hold the label inside the circle" cameraFirst busy={false} error={null} onCode={setCode} />
      {code === '' ? null : <Scanned key={code} code={code} />}
    </PageFrame>
  );
}
