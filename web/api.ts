import type { LoadProgress, Receipt, Upload } from '../server/shapes/load';
import type { Problem } from '../server/shapes/problem';
import type { RamDetail, Rounds, StoredVisit } from '../server/shapes/ram';
import type { FileReading } from '../server/shapes/reading';
import type { BurstBeats, SeasonCharts } from '../server/shapes/series';

/** What the server could not do, in its own sentence. */
export class Refused extends Error {}

async function answer<T>(response: Response): Promise<T> {
  if (response.ok) return (await response.json()) as T;
  const problem = (await response.json().catch(() => null)) as Problem | null;
  throw new Refused(problem?.detail ?? `The server answered ${response.status}.`);
}

async function ask<T>(address: string, init?: RequestInit): Promise<T> {
  let response: Response;
  try {
    response = await fetch(`/api${address}`, init);
  } catch {
    throw new Refused('The server does not answer. Is Clackwatch still running?');
  }
  return answer<T>(response);
}

const send = <T>(address: string, body: unknown): Promise<T> =>
  ask<T>(address, {
    method: 'POST',
    headers: { 'content-type': 'application/json', 'x-clackwatch': '1' },
    body: JSON.stringify(body),
  });

const at = (key: string) => `/rams/${encodeURIComponent(key)}`;

export interface BurstView {
  beats: BurstBeats;
  trace: { channel: string; unit: string; at_s: number[]; min: (number | null)[]; max: (number | null)[] };
}

export const api = {
  rounds: () => ask<Rounds>('/rounds'),
  rams: () => ask<{ key: string; name: string }[]>('/rams'),
  ram: (key: string) => ask<RamDetail>(at(key)),
  season: (key: string, from: number | null, to: number | null) => {
    const query = new URLSearchParams();
    if (from !== null) query.set('from', new Date(from).toISOString());
    if (to !== null) query.set('to', new Date(to).toISOString());
    return ask<SeasonCharts>(`${at(key)}/season?${query}`);
  },
  addRam: (installation: unknown) => send<{ key: string; name: string }>('/rams', installation),
  addVisit: (key: string, visit: unknown) => send<StoredVisit>(`${at(key)}/visits`, visit),
  preview: (upload: string, reading: FileReading) => send<Upload>(`/uploads/${upload}/preview`, { reading }),
  load: (upload: string, reading: FileReading) => send<LoadProgress>(`/uploads/${upload}/load`, { reading }),
  job: (id: string) => ask<LoadProgress>(`/jobs/${id}`),
  receipt: (load: number) => ask<Receipt>(`/loads/${load}`),
  burst: (id: number) => ask<BurstView>(`/bursts/${id}`),
};

/** Sends a file as it is; tells how much of it has gone. */
export function sendFile(key: string, file: File, onProgress: (share: number) => void): Promise<Upload> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    request.open('POST', `/api${at(key)}/uploads?file=${encodeURIComponent(file.name)}`);
    request.setRequestHeader('content-type', 'application/octet-stream');
    request.setRequestHeader('x-clackwatch', '1');
    request.responseType = 'json';
    request.upload.onprogress = (event) => onProgress(event.lengthComputable ? event.loaded / event.total : 0);
    request.onload = () => {
      if (request.status === 201) resolve(request.response as Upload);
      else
        reject(new Refused((request.response as Problem | null)?.detail ?? `The server answered ${request.status}.`));
    };
    request.onerror = () =>
      reject(new Refused('The file could not be sent: the server does not answer, or the link dropped. Try again.'));
    request.send(file);
  });
}

/** Follows a load to its end, by events, or by asking every second where events do not come through. */
export function followJob(job: LoadProgress, onProgress: (progress: LoadProgress) => void): () => void {
  const ended = (progress: LoadProgress) => progress.stage === 'done' || progress.stage === 'failed';
  let timer = 0;
  const events = new EventSource(`/api/jobs/${job.job_id}/events`);
  events.onmessage = (event: MessageEvent<string>) => {
    const progress = JSON.parse(event.data) as LoadProgress;
    onProgress(progress);
    if (ended(progress)) events.close();
  };
  events.onerror = () => {
    events.close();
    const poll = () =>
      api.job(job.job_id).then(
        (progress) => {
          onProgress(progress);
          if (!ended(progress)) timer = window.setTimeout(poll, 1000);
        },
        (error: Error) => onProgress({ ...job, stage: 'failed', error: error.message }),
      );
    void poll();
  };
  return () => {
    events.close();
    clearTimeout(timer);
  };
}
