import { useRef, useState } from 'react';
import { call, problemWords } from '@/lib/client/call';
import { paths } from '@/lib/paths';
import type { CheckedFile } from '@/lib/schemas/import-shapes';
import type { RunSummary } from '@/lib/schemas/run-shapes';

export interface Import {
  readonly name: string;
  readonly busy: 'checking' | 'storing' | null;
  readonly checked: CheckedFile | null;
  readonly trouble: string | null;
  readonly check: (file: File, machine: string) => Promise<void>;
  /** Checks the same file for another machine. */
  readonly checkAgain: (machine: string) => Promise<void>;
  readonly store: (machine: string) => Promise<void>;
}

const asked = (path: string, fields: Record<string, string>): string => `${path}?${new URLSearchParams(fields)}`;

/** A file on its way to a run: read once, checked by the server, stored only when somebody has looked and said so. */
export function useImport(): Import {
  const [name, setName] = useState('');
  const [busy, setBusy] = useState<Import['busy']>(null);
  const [checked, setChecked] = useState<CheckedFile | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  const bytes = useRef<Blob | null>(null);
  /** Counts checks, so that an answer that comes late does not replace a newer one. */
  const latest = useRef(0);

  const ask = async (blob: Blob, fileName: string, machine: string): Promise<void> => {
    latest.current += 1;
    const turn = latest.current;
    setBusy('checking');
    setChecked(null);
    setTrouble(null);
    const answer = await call<CheckedFile>('POST', asked(paths.api.importCheck, { machine, name: fileName }), blob);
    if (turn !== latest.current) return;
    setBusy(null);
    if (answer.ok) setChecked(answer.value);
    else setTrouble(problemWords(answer.problem));
  };

  return {
    name,
    busy,
    checked,
    trouble,
    check: async (file, machine) => {
      setName(file.name);
      // Read now: what is stored is then what was checked, even when the file changes on the disk meanwhile.
      const blob = new Blob([await file.arrayBuffer()]);
      bytes.current = blob;
      if (machine !== '') await ask(blob, file.name, machine);
    },
    checkAgain: async (machine) => {
      if (bytes.current && machine !== '') await ask(bytes.current, name, machine);
    },
    store: async (machine) => {
      if (!bytes.current || !checked || busy) return;
      setBusy('storing');
      setTrouble(null);
      const fields = { machine, name: checked.name, sha256: checked.sha256, ...(checked.already && { again: 'true' }) };
      const answer = await call<RunSummary>('POST', asked(paths.api.imports, fields), bytes.current);
      if (answer.ok) location.assign(paths.run(answer.value.id));
      else {
        setBusy(null);
        setTrouble(problemWords(answer.problem));
      }
    },
  };
}
