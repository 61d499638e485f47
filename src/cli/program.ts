import { Command, InvalidArgumentError, Option } from 'commander'
import type { Io } from './io.ts'
import type { Tool } from './version.ts'

/** Every command of this version, for help and for the nearest-word hint. */
export const commandNames: readonly string[] = ['memo', 'check', 'why', 'nodes', 'start', 'guide', 'schema']

const STATUSES = `
Exit status:
  0  done
  1  a fault of the program itself
  2  the input is wrong; every fault is listed with its place and remedy
  3  a node named by --must-pass does not pass`

const example = (...lines: string[]) =>
  `\nExample:\n${lines.map((line) => `  ${line}`).join('\n')}\n${STATUSES}`

const FORMATS = ['html', 'pdf', 'json', 'csv'] as const
/** Formats in which a memo can be written. */
export type MemoFormat = (typeof FORMATS)[number]

function formats(text: string): readonly MemoFormat[] {
  const words = text.split(',').map((word) => word.trim())
  const wrong = words.filter((word) => !(FORMATS as readonly string[]).includes(word))
  if (wrong.length > 0) throw new InvalidArgumentError(`Allowed, separated by commas: ${FORMATS.join(', ')}.`)
  return FORMATS.filter((format) => words.includes(format))
}

function date(text: string): string {
  const day = new Date(`${text}T00:00:00Z`)
  const right = /^\d{4}-\d{2}-\d{2}$/.test(text) && !Number.isNaN(day.getTime())
  if (!right || day.toISOString().slice(0, 10) !== text) {
    throw new InvalidArgumentError('Allowed: a day of the calendar as YYYY-MM-DD.')
  }
  return text
}

type Leave = (status: number) => void

function addMemo(program: Command, io: Io, tool: Tool, leave: Leave): void {
  program
    .command('memo')
    .summary('write the memo of a scenario')
    .description('Writes the feasibility memo of a scenario, in each format, beside each other.')
    .argument('<FILE>', 'scenario file')
    .option('--out <DIR>', 'folder to write into', '.')
    .addOption(
      new Option('--as <FORMATS>', 'formats, separated by commas')
        .argParser(formats)
        .default([...FORMATS], FORMATS.join(',')),
    )
    .option('--date <YYYY-MM-DD>', "date printed on the memo, instead of the scenario's", date)
    .addOption(new Option('--paper <SIZE>', 'paper of the PDF').choices(['a4', 'letter']).default('a4'))
    .addHelpText('after', example('tapeworthy memo lane.yaml --out memos --as html,pdf'))
    .action(async (file, options) => leave(await (await import('./memo.ts')).memo(file, options, io, tool)))
}

function addCheck(program: Command, io: Io, tool: Tool, leave: Leave): void {
  program
    .command('check')
    .summary('verdict of every option in every node')
    .description(
      'Judges a scenario and prints the verdict of every option in every node with what limits it.',
    )
    .argument('<FILE>', 'scenario file')
    .option('--json', 'print the whole result as JSON')
    .option('--must-pass <NODES...>', 'nodes in which at least one option must pass; status 3 if not')
    .addHelpText(
      'after',
      example('tapeworthy check lane.yaml', 'tapeworthy check lane.yaml --must-pass F16 P28'),
    )
    .action(async (file, options) => leave(await (await import('./check.ts')).check(file, options, io, tool)))
}

function addWhy(program: Command, io: Io, tool: Tool, leave: Leave): void {
  program
    .command('why')
    .summary('the derivation of a case or of one check')
    .description('Prints how the numbers of one option in one node come about, formula by formula.')
    .argument('<FILE>', 'scenario file')
    .argument('<OPTION>', 'id of the option')
    .argument('<NODE>', 'id of the node')
    .argument('[CHECK]', 'id of one check; all of them when left out')
    .addHelpText('after', example('tapeworthy why lane.yaml pam4-112 F16 clock_buffers.speed'))
    .action(async (file, option, node, check) =>
      leave(await (await import('./why.ts')).why({ file, option, node, check }, io, tool)),
    )
}

function addNodes(program: Command, io: Io, leave: Leave): void {
  program
    .command('nodes')
    .summary('the built-in node classes and their sources')
    .description('Lists the built-in node classes; with an id, every value of that class and its source.')
    .argument('[ID]', 'id of a class')
    .addHelpText('after', example('tapeworthy nodes P28'))
    .action(async (id) => leave(await (await import('./nodes.ts')).nodes(id, io)))
}

function addStart(program: Command, io: Io, leave: Leave): void {
  program
    .command('start')
    .summary('write a commented starter scenario')
    .description('Writes a commented starter scenario. Never overwrites a file.')
    .argument('<link|clock>', 'what is planned: a lane of a link, or a clock generator')
    .argument('<FILE>', 'file to write')
    .addHelpText('after', example('tapeworthy start link lane.yaml'))
    .action(async (block, file) => leave(await (await import('./start.ts')).start(block, file, io)))
}

function addGuide(program: Command, io: Io, tool: Tool, leave: Leave): void {
  program
    .command('guide')
    .summary("write the user's guide as one HTML file")
    .description(
      "Writes the user's guide: scenario keys, node files, error codes, method, hand calculations.",
    )
    .option('--out <FILE>', 'file to write', 'tapeworthy-guide.html')
    .addHelpText('after', example('tapeworthy guide --out guide.html'))
    .action(async (options) => leave(await (await import('./guide.ts')).guide(options, io, tool)))
}

function addSchema(program: Command, io: Io, leave: Leave): void {
  program
    .command('schema')
    .summary('JSON Schema of scenario or node files')
    .description('Prints the JSON Schema of scenario files or of node files.')
    .argument('[scenario|node]', 'which files', 'scenario')
    .addHelpText('after', example('tapeworthy schema node > node.schema.json'))
    .action(async (which) => leave(await (await import('./schema.ts')).schema(which, io)))
}

/**
 * The command line as commander sees it. Each command loads its own part only when it runs.
 *
 * @param io streams and files
 * @param tool name and version to print
 * @param leave takes the exit status of the command that ran
 */
export function programFor(io: Io, tool: Tool, leave: Leave): Command {
  const program = new Command(tool.name)
    .description('Feasibility planner for the clocking and SerDes blocks of a chip.')
    .version(tool.version, '--version', 'print the version')
    .helpOption('-h, --help', 'show this help')
    .helpCommand('help [command]', 'show the help of a command')
    .showHelpAfterError('(--help shows what is allowed)')
    .configureOutput({
      writeOut: (text) => io.stdout.write(text),
      writeErr: (text) => io.stderr.write(text),
      getOutHelpWidth: () => io.stdout.columns ?? 80,
      getErrHelpWidth: () => io.stderr.columns ?? 80,
      getOutHasColors: () => false,
      getErrHasColors: () => false,
    })
    .exitOverride()
    .addHelpText('after', example('tapeworthy start link lane.yaml', 'tapeworthy memo lane.yaml'))
  addMemo(program, io, tool, leave)
  addCheck(program, io, tool, leave)
  addWhy(program, io, tool, leave)
  addNodes(program, io, leave)
  addStart(program, io, leave)
  addGuide(program, io, tool, leave)
  addSchema(program, io, leave)
  return program
}
