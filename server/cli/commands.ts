import { UserError } from '../shapes/problem';
import { beatsCommand, loadCommand } from './file-commands';
import { figuresCommand, findingsCommand, ramsCommand, visitsCommand } from './ram-commands';
import { demoCommand, type Program, serveCommand } from './serve-command';

const help = `clackwatch: keeps watch over installed hydraulic rams through their logger files

  clackwatch rams                              list the rams
  clackwatch rams add FILE.json                add a ram from a description of its installation
  clackwatch rams schema                       JSON Schema of that description
  clackwatch visits list --ram NAME            visits of a ram
  clackwatch visits add FILE.json --ram NAME   enter a visit (date, bucket tests, actions), or a list of them
  clackwatch load FILE… --ram NAME             load logger files; with --inspect only show how they would be read
      --day-order "day first"|"month first"    where the file's own dates do not tell
      --zone ram|utc|+05:45|ZONE               clock of the logger
      --start-at INSTANT                       start of a burst that does not tell
      --reading FILE.json                      a whole reading, as --inspect --json prints it
  clackwatch beats FILE --ram NAME             beats of a pressure burst, without storing it
  clackwatch figures --ram NAME                figures; --from, --to, --every interval|hour|day
  clackwatch findings [--ram NAME] [--all]     findings; exit status 3 if somebody should go now
  clackwatch serve                             serve the page; --port N (4310), --demonstration, --empty
  clackwatch demo                              make the demonstration's database

  Every command takes --data DIR (data/own, or what CLACKWATCH_DATA says) and --json.
  Exit status: 0 done, 2 something you gave is not right (told in a sentence), 3 go now, 1 our mistake.
`;

/** Runs one command line; returns the exit status. */
export async function runCommand(args: string[], program: Program): Promise<number> {
  const [command, ...rest] = args;
  switch (command) {
    case 'rams':
      return ramsCommand(rest);
    case 'visits':
      return visitsCommand(rest);
    case 'load':
      return loadCommand(rest);
    case 'beats':
      return beatsCommand(rest);
    case 'figures':
      return figuresCommand(rest);
    case 'findings':
      return findingsCommand(rest);
    case 'serve':
      return serveCommand(rest, program);
    case 'demo':
      return demoCommand(rest, program);
    case 'version':
    case '--version':
      process.stdout.write(`${program.version}\n`);
      return 0;
    case undefined:
    case 'help':
    case '--help':
      process.stdout.write(help);
      return 0;
    default:
      throw new UserError(`"${command}" is not a command. "clackwatch help" lists them.`);
  }
}
