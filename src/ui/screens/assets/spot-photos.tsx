/** Photos of a spot, so that the next one finds it: scaled down, place and camera marks taken out, undoable. */
import { useEffect, useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { Button } from '../../components/button.tsx';
import { FileButton } from '../../components/file-button.tsx';
import { useLoaded } from '../../use-loaded.ts';
import styles from './spot-photos.module.css';

const text = officeText.places;

export function SpotPhotos({ app, spot }: { readonly app: App; readonly spot: string }) {
  const photos = useLoaded(app.store, () => app.readings.photos(spot), [spot]);
  const add = async (file: File) => {
    try {
      const { jpeg, widthPx, heightPx } = await app.store.preparePhoto(file);
      await app.readings.savePhoto(spot, jpeg, widthPx, heightPx);
    } catch (error) {
      app.noteError(error);
      app.notices.show(text.photoFailed, { tone: 'failure' });
    }
  };
  return (
    <section class="stack stack-tight">
      {photos && photos.length > 0 && (
        <ul class={styles.photos}>
          {photos.map((photo, index) => (
            <li key={photo.id}>
              <Photo jpeg={photo.jpeg} name={text.photoName(index + 1)} />
              <Button
                kind="quiet"
                label={`${screenText.common.remove}: ${text.photoName(index + 1)}`}
                onClick={() => void app.readings.edit(photo.id, { trashed: true }, text.photoTrashed)}
              >
                {screenText.common.remove}
              </Button>
            </li>
          ))}
        </ul>
      )}
      <div class="row">
        <FileButton kind="quiet" accept="image/*" label={text.addPhoto} onFile={(file) => void add(file)} />
      </div>
    </section>
  );
}

function Photo({ jpeg, name }: { readonly jpeg: Uint8Array; readonly name: string }) {
  const [url, setUrl] = useState<string>();
  useEffect(() => {
    const made = URL.createObjectURL(new Blob([jpeg.slice()], { type: 'image/jpeg' }));
    setUrl(made);
    return () => URL.revokeObjectURL(made);
  }, [jpeg]);
  return url ? <img src={url} alt={name} class={styles.photo} /> : null;
}
