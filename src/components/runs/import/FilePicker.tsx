import { type DragEvent, type ReactElement, useState } from 'react';

interface Props {
  readonly name: string;
  readonly onPick: (file: File) => void;
}

/** Takes a file by a click, a key or a drop. */
export function FilePicker({ name, onPick }: Props): ReactElement {
  const [over, setOver] = useState(false);
  const drag = (event: DragEvent, is: boolean): void => {
    event.preventDefault();
    setOver(is);
  };
  return (
    <label
      className={`grid min-h-32 content-center gap-1 border border-dashed p-5 focus-within:outline-3 focus-within:outline-offset-2 focus-within:outline-verdigris hover:bg-verdigris-wash ${over ? 'border-verdigris bg-verdigris-wash' : 'border-rule-firm'}`}
      onDragOver={(event) => drag(event, true)}
      onDragLeave={(event) => drag(event, false)}
      onDrop={(event) => {
        drag(event, false);
        const [file] = event.dataTransfer.files;
        if (file) onPick(file);
      }}
    >
      <span className="font-bold">{name === '' ? 'Choose a file, or drop it here' : name}</span>
      <span className="text-sm text-ink-soft">
        {name === ''
          ? 'CSV in UTF-8, at most 1 MiB and 10,000 rows; comma, semicolon or tab.'
          : 'Choose or drop another one to take its place.'}
      </span>
      <input
        type="file"
        accept=".csv,.tsv,.txt,text/csv"
        className="sr-only"
        onChange={({ target }) => {
          const [file] = target.files ?? [];
          if (file) onPick(file);
          // The same file, put right meanwhile, can then be chosen again.
          target.value = '';
        }}
      />
    </label>
  );
}
