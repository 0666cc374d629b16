import { useId } from 'react';
import { Stack, Text } from '@/components/ui';

/** The browser's own file choice; on a phone it offers the camera. */
export function PhotoPicker({ photo, onPick, error }: { photo: File | null; onPick: (photo: File | null) => void; error: string | undefined }) {
  const id = useId();
  return (
    <Stack gap="xs">
      <label htmlFor={id}>
        <Text strong>Add a photo</Text>
      </label>
      <Text size="quiet" tone="soft">JPEG, PNG or WebP, at most 8 MB. Place and time in the file are removed.</Text>
      <input
        id={id}
        type="file"
        accept="image/jpeg,image/png,image/webp"
        aria-invalid={error !== undefined}
        onChange={(event) => onPick(event.target.files?.[0] ?? null)}
        style={{ minHeight: 44, maxWidth: '100%' }}
      />
      {error ? <Text size="quiet" tone="different" role="alert">{error}</Text> : photo ? <Text size="quiet" tone="soft">{`${Math.ceil(photo.size / 1024)} kB`}</Text> : null}
    </Stack>
  );
}
