import { useRef } from 'preact/hooks';
import { Button } from './button.tsx';
import { IconFile } from './icons.tsx';

/** Opens the file picker; the chosen file may be chosen again afterwards. */
export function FileButton(props: {
  readonly label: string;
  readonly onFile: (file: File) => void;
  readonly accept?: string;
  readonly kind?: 'plain' | 'quiet';
}) {
  const input = useRef<HTMLInputElement>(null);
  return (
    <>
      <input
        ref={input}
        type="file"
        class="unseen"
        tabIndex={-1}
        aria-hidden="true"
        accept={
          props.accept ?? '.csv,.tsv,.txt,.zip,text/csv,text/tab-separated-values,text/plain,application/zip'
        }
        onChange={(event) => {
          const file = event.currentTarget.files?.[0];
          event.currentTarget.value = '';
          if (file) props.onFile(file);
        }}
      />
      <Button kind={props.kind ?? 'plain'} onClick={() => input.current?.click()}>
        <IconFile />
        {props.label}
      </Button>
    </>
  );
}
