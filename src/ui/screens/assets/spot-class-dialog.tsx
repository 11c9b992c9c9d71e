import { useState } from 'preact/hooks';
import type { FieldValue } from '../../../core/model/fact.ts';
import type { Place } from '../../../core/model/place.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { screenText } from '../../../text/screens.ts';
import { Button } from '../../components/button.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { detailFields, detailsOf, SpotDetails } from './spot-details.tsx';

/** What the criteria need to know of a spot, asked from a reading that lacks it. */
export function SpotClassDialog(props: {
  readonly place: Place;
  readonly onSave: (fields: Readonly<Record<string, FieldValue>>) => void;
  readonly onClose: () => void;
}) {
  const [details, setDetails] = useState(() => detailsOf(props.place));
  return (
    <Dialog
      title={readingText.levels.sayClass}
      onClose={props.onClose}
      actions={
        <Button kind="main" onClick={() => props.onSave(detailFields(details))}>
          {screenText.common.save}
        </Button>
      }
    >
      <SpotDetails kind={props.place.kind} details={details} onChange={setDetails} />
    </Dialog>
  );
}
