import { execFile, spawn, type ChildProcess } from 'node:child_process';
import { access } from 'node:fs/promises';

const COMMAND = 'build/cli/loopwright.js';

/** What a run of the command came to. */
export interface CommandRun {
  readonly code: number | string | null;
  readonly output: string;
  readonly complaints: string;
}

/** Runs the built command to its end. */
export async function runCommand(...words: readonly string[]): Promise<CommandRun> {
  await demandBuild();
  return new Promise((settle) => {
    const limits = { maxBuffer: 64 * 1024 * 1024 };
    execFile(process.execPath, [COMMAND, ...words], limits, (error, output, complaints) => {
      settle({ code: error === null ? 0 : (error.code ?? null), output, complaints });
    });
  });
}

/** A `serve` that is running, and where. */
export interface RunningServer {
  readonly address: string;
  /** Interrupts it as Ctrl-C does; the exit code. */
  stop(): Promise<number | null>;
}

/** Starts the built `serve` on a folder and a port of its own. */
export async function startServer(folder: string): Promise<RunningServer> {
  await demandBuild();
  const server = spawn(process.execPath, [COMMAND, 'serve', folder, '--port', '0']);
  const ended = new Promise<number | null>((settle) => server.once('exit', settle));
  const address = await addressOf(server);
  return {
    address,
    stop() {
      server.kill('SIGINT');
      return ended;
    },
  };
}

function addressOf(server: ChildProcess): Promise<string> {
  return new Promise((settle, fail) => {
    let said = '';
    const listen = (piece: Buffer) => {
      said += piece.toString();
      const address = /^http:\/\/\S+$/m.exec(said)?.[0];
      if (address !== undefined) settle(address);
    };
    server.stdout?.on('data', listen);
    server.stderr?.on('data', listen);
    server.once('exit', (code) => fail(new Error(`serve ended with ${code}: ${said}`)));
  });
}

async function demandBuild() {
  await access(COMMAND).catch(() => {
    throw new Error(`${COMMAND} is not built: run "npm run build", or "npm test" for all of it.`);
  });
}
