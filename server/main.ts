#!/usr/bin/env node
import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { runCommand } from './cli/commands';
import { isLoadThread, runLoadThread } from './loading/worker';
import { UserError } from './shapes/problem';

/** The folder of the package: the nearest one above this file that has a package.json. */
function packageRoot(): string {
  let folder = path.dirname(fileURLToPath(import.meta.url));
  while (!existsSync(path.join(folder, 'package.json'))) folder = path.dirname(folder);
  return folder;
}

async function main(): Promise<void> {
  const root = packageRoot();
  const { version } = JSON.parse(readFileSync(path.join(root, 'package.json'), 'utf8')) as { version: string };
  try {
    process.exitCode = await runCommand(process.argv.slice(2), { entry: new URL(import.meta.url), root, version });
  } catch (error) {
    if (error instanceof UserError) {
      process.stderr.write(`${error.message}\n`);
      process.exitCode = 2;
    } else {
      console.error(error);
      process.exitCode = 1;
    }
  }
}

await (isLoadThread() ? runLoadThread() : main());
