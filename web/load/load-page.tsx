import { useRef, useState } from 'preact/hooks';
import { api } from '../api';
import { Shown, useAsked } from '../asked';
import { Sheet } from '../sheet';
import { FileCard } from './file-card';

interface Dropped {
  id: number;
  ram: string;
  file: File;
}

let nextId = 1;

/** Files are dropped, looked at, corrected and stored, each for itself. */
export function LoadPage({ ram }: { ram: string | null }) {
  const rams = useAsked('rams', api.rams);
  return (
    <Sheet title="Load">
      <Shown asked={rams}>
        {(list) =>
          list.length === 0 ? (
            <p class="lead">
              First <a href="#/new">add the ram</a> whose logger wrote the file.
            </p>
          ) : (
            <Drop rams={list} chosen={ram} />
          )
        }
      </Shown>
    </Sheet>
  );
}

function Drop({ rams, chosen }: { rams: { key: string; name: string }[]; chosen: string | null }) {
  const [ram, setRam] = useState(chosen ?? (rams.length === 1 ? rams[0]!.key : ''));
  const [files, setFiles] = useState<Dropped[]>([]);
  const [over, setOver] = useState(false);
  const input = useRef<HTMLInputElement>(null);
  const take = (list: FileList | null) => {
    if (list === null || ram === '') return;
    setFiles((before) => [...before, ...Array.from(list, (file) => ({ id: nextId++, ram, file }))]);
  };
  return (
    <>
      <p>
        <label for="which-ram">Which ram? </label>
        <select id="which-ram" value={ram} onChange={(event) => setRam(event.currentTarget.value)}>
          <option value="" disabled>
            choose
          </option>
          {rams.map(({ key, name }) => (
            <option key={key} value={key}>
              {name}
            </option>
          ))}
        </select>
      </p>
      <section
        aria-label="Files"
        class={`drop${over ? ' over' : ''}${ram === '' ? ' off' : ''}`}
        onDragOver={(event) => {
          event.preventDefault();
          setOver(true);
        }}
        onDragLeave={() => setOver(false)}
        onDrop={(event) => {
          event.preventDefault();
          setOver(false);
          take(event.dataTransfer?.files ?? null);
        }}
      >
        <p class="lead">{ram === '' ? 'Choose the ram first.' : "Drop the logger's files here"}</p>
        <input
          ref={input}
          id="files"
          type="file"
          multiple
          hidden
          onChange={(event) => {
            take(event.currentTarget.files);
            event.currentTarget.value = '';
          }}
        />
        <button type="button" class="main" disabled={ram === ''} onClick={() => input.current?.click()}>
          Choose files
        </button>
        <p class="faded">As they came from the logger: nothing is stored before you have seen how each was read.</p>
      </section>
      {files.map(({ id, ram: forRam, file }) => (
        <FileCard key={id} ram={forRam} file={file} />
      ))}
    </>
  );
}
