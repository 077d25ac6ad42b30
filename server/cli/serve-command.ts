import { once } from 'node:events';
import path from 'node:path';
import { makeApp } from '../http/app';
import { makeDemonstration } from '../loading/demonstration';
import { inWorkerThread } from '../loading/worker';
import { UserError } from '../shapes/problem';
import { openStore } from '../store/open';
import { ownData, readOptions } from './options';

/** Where the program's own files lie, given by the entry file. */
export interface Program {
  entry: URL;
  root: string;
  version: string;
}

const demonstrationData = 'data/demonstration';

export async function serveCommand(args: string[], program: Program): Promise<number> {
  const { values } = readOptions(args, {
    port: { type: 'string' },
    empty: { type: 'boolean' },
    demonstration: { type: 'boolean' },
  });
  const port = Number(values.port ?? 4310);
  if (!Number.isInteger(port) || port < 0 || port > 65_535)
    throw new UserError(`--port ${values.port} is not a port; expected a number from 0 to 65535.`);
  const demonstrates = values.demonstration === true && values.empty !== true && values.data === undefined;
  const folder = values.data ?? (demonstrates ? demonstrationData : ownData());
  if (demonstrates) await demonstrationWithProgress(program, folder);
  await serve(folder, port, program);
  return 0;
}

/** Makes the demonstration's database (in data/demonstration, or --data DIR) without serving it. */
export async function demoCommand(args: string[], program: Program): Promise<number> {
  const { values } = readOptions(args, {});
  const folder = values.data ?? demonstrationData;
  await demonstrationWithProgress(program, folder);
  process.stdout.write(
    values.json
      ? `${JSON.stringify({ data: folder })}\n`
      : `The demonstration lies in ${folder}. Look at it with: clackwatch serve --data ${folder}\n`,
  );
  return 0;
}

async function demonstrationWithProgress(program: Program, folder: string): Promise<void> {
  const rewrites = process.stderr.isTTY;
  let told = false;
  await makeDemonstration(path.join(program.root, 'sample-data/files'), folder, (line) => {
    told = true;
    process.stderr.write(rewrites ? `\r${line.padEnd(90)}` : `${line}\n`);
  });
  if (told && rewrites) process.stderr.write('\n');
}

async function serve(folder: string, port: number, program: Program): Promise<void> {
  const db = openStore(folder);
  // a write that meets a long load is told so, rather than holding up everybody
  db.pragma('busy_timeout = 2000');
  const app = makeApp({
    db,
    data_folder: folder,
    web_folder: path.join(program.root, 'dist/web'),
    run_load: inWorkerThread(program.entry),
    version: program.version,
    now: Date.now,
  });
  const server = app.listen(port, '127.0.0.1');
  try {
    await once(server, 'listening');
  } catch (error) {
    db.close();
    if ((error as NodeJS.ErrnoException).code === 'EADDRINUSE')
      throw new UserError(
        `Port ${port} is taken, perhaps by a Clackwatch that is already running. Choose another with --port N.`,
      );
    throw error;
  }
  const address = server.address();
  const taken = typeof address === 'object' && address !== null ? address.port : port;
  process.stdout.write(`Clackwatch is at http://127.0.0.1:${taken} (data in ${folder}; stop with Ctrl+C)\n`);
  await Promise.race([once(process, 'SIGINT'), once(process, 'SIGTERM')]);
  server.close();
  server.closeAllConnections();
  db.close();
}
