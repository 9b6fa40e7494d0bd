import { Command, CommanderError } from 'commander';
import { version } from '../../../package.json';
import { exitStatus } from '../report/checked-file';
import { jsonReport } from '../report/json';
import { colourPalette, plainPalette } from '../report/palette';
import { textReport } from '../report/text';
import { checkFile } from './check';
import { readCutoff, readOrder } from './options';
import { Progress } from './progress';

const narrowest = 60;
const widest = 120;

interface Flags {
  readonly json?: boolean;
  readonly cutoff?: number;
  readonly order?: number;
  readonly full?: boolean;
}

function check(paths: readonly string[], { json, cutoff, order, full }: Flags): void {
  const overrides = { cutoff: cutoff ?? null, order: order ?? null };
  const progress = new Progress(process.stderr);
  const files = paths.map(path => checkFile(path, { overrides, full: full === true, progress: (...news) => progress.update(...news) }));
  progress.end();
  process.exitCode = exitStatus(files);
  process.stdout.write(json ? jsonReport(files, overrides) : textReport(files, width(), palette()));
}

const width = (): number => (process.stdout.isTTY ? Math.max(narrowest, Math.min(process.stdout.columns || 80, widest)) : 100);

const palette = (): typeof plainPalette =>
  process.stdout.isTTY && !process.env['NO_COLOR'] && process.env['TERM'] !== 'dumb' ? colourPalette : plainPalette;

const checkHelp = `
For each model: the monomials of its Dyson series, whether they diverge as the cutoff is lifted, how fast,
which coupling can absorb it, and whether its counterterms cancel it. Then what is wrong, with its place.

Exit status:
  0  every model is well formed, finite to its order and meets its expectations
  1  something is wrong: see the findings marked "error"
  2  the command line could not be used, or a file could not be read

Examples:
  tare check wire.tare                    a report to read
  tare check models/*.tare --json         a report for programs and CI
  tare check wire.tare --order 4          look one order further than the file does
  tare check wire.tare --cutoff 80        the same model at another cutoff`;

function program(): Command {
  const tare = new Command('tare')
    .description('Checks models of low-energy scattering: which terms of the Dyson series diverge, and what cancels them.')
    .version(version, '-V, --version', 'print the version')
    .helpOption('-h, --help', 'print this help')
    .helpCommand('help [command]', 'print the help of a command')
    .addHelpText('after', '\nStart with:\n  tare check FILE.tare\n  tare check --help')
    .showHelpAfterError('Try "tare check --help".')
    .exitOverride();
  tare
    .command('check')
    .description('check model files')
    .argument('<file...>', 'model files (NAME.tare)')
    .option('--json', 'print the report as JSON, format 1')
    .option('--cutoff <momentum>', "cutoff to use instead of each model's own, in its unit of momentum", readCutoff)
    .option('--order <n>', "highest order to look at instead of each model's own", readOrder)
    .option('--full', 'also solve each model without expanding in its interactions')
    .helpOption('-h, --help', 'print this help')
    .addHelpText('after', checkHelp)
    .showHelpAfterError('Try "tare check --help".')
    .exitOverride()
    .action(check);
  return tare;
}

// A reader that has seen enough, such as `head`, is no failure.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit();
  process.stderr.write(`tare: the report could not be written (${error.code ?? error.message}).\n`);
  process.exit(2);
});

try {
  program().parse();
} catch (error) {
  if (!(error instanceof CommanderError)) throw error;
  process.exitCode = error.exitCode === 0 ? 0 : 2;
}
