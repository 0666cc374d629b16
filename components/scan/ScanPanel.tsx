import { useRef, useState } from 'react';
import { parseLabelCode } from '@shared/codes';
import { fieldError } from '@/components/api';
import { Button, Card, Failed, Form, Stack, Text, TextField } from '@/components/ui';
import { codeFaults } from './codeFaults';
import { ScanField } from './ScanField';

export interface ScanPanelProps {
  /** What to scan now, in a sentence. */
  prompt: string;
  /** A well-formed label code, from the camera, a hand scanner or typing. */
  onCode: (code: string) => void;
  busy: boolean;
  /** What became of the last code; a fault of the field `code` is shown beside it. */
  error: unknown;
  /** Opens the camera at once, where scanning is the whole point of the screen. */
  cameraFirst?: boolean;
}

/** A held label is seen many times a second; the same code counts again only after this. */
const repeatMs = 2500;

/**
 * Four equal ways in: the camera, a hand scanner that types and ends with Enter, the label's link pasted, or typing.
 * The camera is the round field of view; typing always stands beside it.
 */
export function ScanPanel({ prompt, onCode, busy, error, cameraFirst = false }: ScanPanelProps) {
  const [camera, setCamera] = useState(cameraFirst);
  const [text, setText] = useState('');
  const [fault, setFault] = useState<string>();
  const last = useRef({ code: '', at: 0 });

  const take = (scanned: string, from: 'camera' | 'typed') => {
    const reading = parseLabelCode(scanned);
    if ('reason' in reading) {
      setFault(codeFaults[reading.reason]);
      return;
    }
    const now = performance.now();
    if (from === 'camera' && last.current.code === reading.code && now - last.current.at < repeatMs) return;
    last.current = { code: reading.code, at: now };
    setFault(undefined);
    // What the camera sees must not wipe a code that is being typed.
    if (from === 'typed') setText('');
    onCode(reading.code);
  };

  const wrong = fault ?? fieldError(error, 'code');
  return (
    <Card>
      <Text strong>{prompt}</Text>
      {camera ? <ScanField onScanned={(scanned) => take(scanned, 'camera')} onClose={() => setCamera(false)} /> : null}
      <Form label="Label code" gap="md" onSubmit={() => take(text, 'typed')}>
        <TextField
          label="Label code"
          hint="Typed or from a hand scanner: 12 characters, in any grouping."
          mono
          value={text}
          error={wrong}
          onChange={(value) => {
            setText(value);
            setFault(undefined);
          }}
          autoCapitalize="characters"
          autoComplete="off"
        />
        <Stack gap="sm">
          <Button label="Use this code" submits busy={busy} kind={camera ? 'secondary' : 'primary'} />
          {camera ? null : <Button kind="secondary" label="Scan with the camera" onPress={() => setCamera(true)} />}
        </Stack>
      </Form>
      {error && fieldError(error, 'code') === undefined ? <Failed error={error} /> : null}
    </Card>
  );
}
