import { readFileSync } from 'node:fs';
import { type ParseArgsConfig, parseArgs } from 'node:util';
import type { ZodType, z } from 'zod';
import { sentenceOfIssues, UserError } from '../shapes/problem';

/** Options that every command takes. */
const common = { data: { type: 'string' }, json: { type: 'boolean' } } as const;

/** Reads a command's options; an unknown or incomplete one is told in a sentence. */
export function readOptions<T extends NonNullable<ParseArgsConfig['options']>>(args: string[], options: T) {
  try {
    return parseArgs({ args, options: { ...common, ...options }, allowPositionals: true, strict: true });
  } catch (error) {
    throw new UserError(
      `${(error as Error).message.split('. ')[0]}. "clackwatch help" lists the commands and their options.`,
    );
  }
}

/** Where a person's own rams are kept unless --data says otherwise. */
export const ownData = (): string => process.env.CLACKWATCH_DATA ?? 'data/own';

export function required(value: string | undefined, option: string): string {
  if (value === undefined || value.trim() === '')
    throw new UserError(`${option} is missing. "clackwatch help" lists the commands and their options.`);
  return value;
}

/** Reads a JSON file and validates it; says which file, and which field, is wrong. */
export function readJson<T extends ZodType>(file: string, schema: T): z.infer<T> {
  let text: string;
  try {
    text = readFileSync(file, 'utf8').replace(/^\uFEFF/, '');
  } catch {
    throw new UserError(`${file} cannot be opened. Is the name right?`, 'not found');
  }
  let body: unknown;
  try {
    body = JSON.parse(text);
  } catch (error) {
    throw new UserError(`${file} is not JSON: ${(error as Error).message}.`);
  }
  const result = schema.safeParse(body);
  if (!result.success) throw new UserError(sentenceOfIssues(result.error, file));
  return result.data;
}

/** Prints a result: JSON as it is when asked for, otherwise the lines for a person. */
export function print(asJson: boolean | undefined, result: unknown, lines: () => string[]): void {
  process.stdout.write(asJson ? `${JSON.stringify(result, null, 2)}\n` : `${lines().join('\n')}\n`);
}
