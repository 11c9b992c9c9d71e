import { useState } from 'preact/hooks';
import type { CautionCode } from '../../../core/model/judgement.ts';
import { cautionSentence } from '../../../text/cautions.ts';
import { screenText } from '../../../text/screens.ts';
import { Button } from '../../components/button.tsx';
import { Dialog } from '../../components/dialog.tsx';
import { CheckField } from '../../components/field.tsx';

/** Where hands or lives are near: read, confirmed by a mark, then on. Confirming is the tap that opens the sensor. */
export function CautionDialog(props: {
  readonly cautions: readonly CautionCode[];
  /** Says what confirming switches on: the sensor or the practice rig. */
  readonly confirm: string;
  readonly onConfirm: () => void;
  readonly onClose: () => void;
}) {
  const [isRead, setIsRead] = useState(false);
  return (
    <Dialog
      title={screenText.take.cautionTitle}
      onClose={props.onClose}
      actions={
        <>
          <Button onClick={props.onClose}>{screenText.common.cancel}</Button>
          <Button kind="main" disabled={!isRead} onClick={props.onConfirm}>
            {props.confirm}
          </Button>
        </>
      }
    >
      <ul class="stack">
        {props.cautions.map((code) => (
          <li key={code}>{cautionSentence(code)}</li>
        ))}
      </ul>
      <CheckField label={screenText.take.cautionConfirm} checked={isRead} onChange={setIsRead} />
    </Dialog>
  );
}
