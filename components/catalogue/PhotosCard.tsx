import { useEffect, useState } from 'react';
import type { PhotoView, StoneView } from '@shared/api/kits';
import { fieldError, useApi } from '@/components/api';
import { Button, Card, Failed, Row, Stack, Text, TextField, useAnnounce } from '@/components/ui';
import { PhotoPicker } from './PhotoPicker';
import { usePhotoMutation, useRemovePhotoMutation } from './queries';

/** Photos of a stone: the only individual mark is what a photograph of inclusions and chips shows. */
export function PhotosCard({ stone }: { stone: StoneView }) {
  const [photo, setPhoto] = useState<File | null>(null);
  const [note, setNote] = useState('');
  const upload = usePhotoMutation(stone.id);
  const announce = useAnnounce();
  const send = () => {
    if (photo) upload.mutate({ photo, note }, { onSuccess: () => { setPhoto(null); setNote(''); announce('Photo added'); } });
  };
  return (
    <Card title="Photos">
      {stone.photos.length === 0 ? <Text tone="soft">No photo yet. Take one of the dome and one of the back, with any chips and inclusions in focus.</Text> : null}
      <Row wrap>
        {stone.photos.map((one) => <Photo key={one.id} photo={one} />)}
      </Row>
      <PhotoPicker photo={photo} onPick={setPhoto} error={fieldError(upload.error, 'photo')} />
      {photo ? (
        <Stack>
          <TextField label="What it shows" optional value={note} onChange={setNote} error={fieldError(upload.error, 'note')} maxLength={200} />
          <Button label="Add this photo" busy={upload.isPending} onPress={send} />
        </Stack>
      ) : null}
      {upload.error && !fieldError(upload.error, 'photo') ? <Failed error={upload.error} /> : null}
    </Card>
  );
}

function Photo({ photo }: { photo: PhotoView }) {
  const source = usePhotoSource(photo);
  const remove = useRemovePhotoMutation();
  const name = photo.note || 'Photo of the stone';
  return (
    <Stack gap="xs">
      {source ? <img src={source} alt={name} style={{ width: 140, height: 140, objectFit: 'cover', borderRadius: 8 }} /> : <Text size="quiet" tone="soft">Fetching …</Text>}
      <Text size="quiet">{photo.note}</Text>
      <Button kind="quiet" label="Remove" accessibleLabel={`Remove: ${name}`} busy={remove.isPending} onPress={() => remove.mutate(photo.id)} />
    </Stack>
  );
}

/** Photos need the session, so they are fetched like data and shown from memory. */
function usePhotoSource(photo: PhotoView): string | null {
  const api = useApi();
  const [source, setSource] = useState<string | null>(null);
  useEffect(() => {
    const controller = new AbortController();
    let made: string | null = null;
    void api.blob(photo.thumbnailUrl.replace(/^.*\/api\/v1/, ''), { signal: controller.signal }).then(
      (blob) => {
        made = URL.createObjectURL(blob);
        setSource(made);
      },
      () => undefined,
    );
    return () => {
      controller.abort();
      if (made) URL.revokeObjectURL(made);
    };
  }, [api, photo.thumbnailUrl]);
  return source;
}
