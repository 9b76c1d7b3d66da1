import { spawn } from 'node:child_process';

/**
 * @typedef {object} CommandResult
 * @property {number} code exit status; 127 when the program is missing, 128 when a signal ended it
 * @property {string} output standard output
 * @property {string} errors standard error
 */

/** @type {Set<import('node:child_process').ChildProcess>} */
const running = new Set();

/**
 * Runs a program to its end and collects what it printed. Never rejects: the caller judges the status.
 * @param {string} program
 * @param {string[]} args
 * @param {import('node:child_process').SpawnOptions & { input?: string }} [options]
 * @returns {Promise<CommandResult>}
 */
export function runCommand(program, args, { input, ...options } = {}) {
  return new Promise((resolve) => {
    const child = spawn(program, args, { ...options, stdio: ['pipe', 'pipe', 'pipe'] });
    running.add(child);
    let output = '';
    let errors = '';
    /** @param {number} code */
    const end = (code) => {
      running.delete(child);
      resolve({ code, output, errors });
    };
    child.stdout.setEncoding('utf8').on('data', (text) => (output += text));
    child.stderr.setEncoding('utf8').on('data', (text) => (errors += text));
    child.on('error', (error) => {
      errors += error.message;
      end(127);
    });
    child.on('close', (code) => end(code ?? 128));
    // A program that ends before it has read its input is judged by its status, not by the broken pipe.
    child.stdin.on('error', () => undefined).end(input);
  });
}

/** Asks every program that is still running to end. */
export function endCommands() {
  for (const child of running) child.kill('SIGTERM');
}

/**
 * The last lines of a longer text, to show why something failed.
 * @param {string} text
 * @param {number} [lines]
 */
export function lastLines(text, lines = 20) {
  return text.trim().split('\n').slice(-lines).join('\n');
}
