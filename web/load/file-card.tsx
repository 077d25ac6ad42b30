import { useEffect, useState } from 'preact/hooks';
import type { LoadProgress, Upload } from '../../server/shapes/load';
import type { FileReading } from '../../server/shapes/reading';
import { api, followJob, sendFile } from '../api';
import { Shown, useAsked } from '../asked';
import { Questions } from './questions';
import { ReadingSettings } from './reading-settings';
import { ReadingTable } from './reading-table';
import { Receipt } from './receipt';

type Stage =
  | { at: 'sending'; share: number }
  | { at: 'looking'; upload: Upload }
  | { at: 'storing'; upload: Upload; progress: LoadProgress }
  | { at: 'stored'; load: number }
  | { at: 'refused'; why: string };

/** One file on its way: sent, looked at, corrected, stored, told. */
export function FileCard({ ram, file }: { ram: string; file: File }) {
  const [stage, setStage] = useState<Stage>({ at: 'sending', share: 0 });
  useEffect(() => {
    sendFile(ram, file, (share) => setStage({ at: 'sending', share })).then(
      (upload) => setStage({ at: 'looking', upload }),
      (error: Error) => setStage({ at: 'refused', why: error.message }),
    );
  }, []);
  return (
    <article class="file" aria-label={file.name}>
      <h2>{file.name}</h2>
      <div aria-live="polite">
        {stage.at === 'sending' && (
          <Progress label={stage.share < 1 ? 'Sending' : 'Looking at it'} share={stage.share} />
        )}
        {stage.at === 'refused' && (
          <p class="refused" role="alert">
            {stage.why}
          </p>
        )}
        {stage.at === 'storing' && (
          <Progress
            label={
              stage.progress.stage === 'computing' ? 'Working out the figures' : `Storing, ${stage.progress.rows} rows`
            }
            share={stage.progress.share}
          />
        )}
      </div>
      {stage.at === 'looking' && <Looking upload={stage.upload} onStage={setStage} />}
      {stage.at === 'stored' && <Stored load={stage.load} />}
    </article>
  );
}

function Progress({ label, share }: { label: string; share: number }) {
  return (
    <p class="progress">
      <label>
        {label} <progress max={1} value={share} /> {Math.round(share * 100)} %
      </label>
    </p>
  );
}

function Looking({ upload, onStage }: { upload: Upload; onStage: (stage: Stage) => void }) {
  const [looked, setLooked] = useState(upload);
  const [why, setWhy] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const change = (reading: FileReading) => {
    setBusy(true);
    setLooked((before) => ({ ...before, reading }));
    api
      .preview(upload.upload_id, reading)
      .then(
        (next) => {
          setLooked(next);
          setWhy(null);
        },
        (error: Error) => setWhy(error.message),
      )
      .finally(() => setBusy(false));
  };
  const store = () => {
    setBusy(true);
    api.load(upload.upload_id, looked.reading).then(
      (job) => {
        onStage({ at: 'storing', upload: looked, progress: job });
        followJob(job, (progress) => {
          if (progress.stage === 'done' && progress.load_id !== null) onStage({ at: 'stored', load: progress.load_id });
          else if (progress.stage === 'failed')
            onStage({ at: 'refused', why: progress.error ?? 'The load failed; nothing of it was stored.' });
          else onStage({ at: 'storing', upload: looked, progress });
        });
      },
      (error: Error) => {
        setWhy(error.message);
        setBusy(false);
      },
    );
  };
  if (looked.already_loaded !== null)
    return (
      <p class="lead">
        This very file was loaded before (
        <a href={`#/receipt/${looked.already_loaded.load_id}`}>receipt {looked.already_loaded.load_id}</a>): nothing to
        add.
      </p>
    );
  const open = looked.questions.filter((question) => question.must_answer).length;
  return (
    <>
      <p>
        {looked.remembered
          ? 'Read as the last file of this logger was.'
          : 'Read as follows; every choice can be changed.'}{' '}
        {looked.reading.kind === 'burst' ? 'A burst of fast pressure samples.' : ''}
      </p>
      <Questions looked={looked} onChange={change} />
      <ReadingTable looked={looked} onChange={change} />
      <ReadingSettings reading={looked.reading} onChange={change} />
      {why !== null && (
        <p class="refused" role="alert">
          {why}
        </p>
      )}
      <p>
        <button type="button" class="main" disabled={busy || open > 0} onClick={store}>
          Store this file
        </button>
        {open > 0 && (
          <span class="faded"> Answer {open === 1 ? 'the question' : `the ${open} questions`} above first.</span>
        )}
      </p>
    </>
  );
}

function Stored({ load }: { load: number }) {
  const asked = useAsked(String(load), () => api.receipt(load));
  return <Shown asked={asked}>{(receipt) => <Receipt receipt={receipt} />}</Shown>;
}
