import { Worker } from 'node:worker_threads';
import type { PdfAnswer, PdfRequest, PdfTask } from './proofPdf.worker';

interface Waiting {
  resolve: (bytes: Uint8Array | null) => void;
  reject: (error: Error) => void;
  timer: NodeJS.Timeout;
}

/** A record of any size that fits into memory is drawn in far less. */
const LONGEST_MS = 60_000;
/** A thread with its fonts loaded is kept for the next page, but not for ever. */
const IDLE_MS = 30_000;

let thread: Worker | null = null;
let idle: NodeJS.Timeout | undefined;
let count = 0;
const waiting = new Map<number, Waiting>();

function endThread(error: Error): void {
  const ending = thread;
  thread = null;
  clearTimeout(idle);
  for (const { reject, timer } of waiting.values()) {
    clearTimeout(timer);
    reject(error);
  }
  waiting.clear();
  void ending?.terminate();
}

function settle(answer: PdfAnswer): void {
  const found = waiting.get(answer.id);
  waiting.delete(answer.id);
  if (waiting.size === 0) {
    thread?.unref();
    idle = setTimeout(() => endThread(new Error('idle')), IDLE_MS).unref();
  }
  if (!found) return;
  clearTimeout(found.timer);
  if ('bytes' in answer) found.resolve(answer.bytes);
  else found.reject(new Error(`The page could not be drawn: ${answer.error}`));
}

function startThread(): Worker {
  // From the sources the thread needs a loader first; from a bundle it is a program beside this one.
  const isSource = import.meta.url.endsWith('.ts');
  const program = new URL(`./proofPdf.worker.${isSource ? 'ts' : 'js'}`, import.meta.url);
  const file = isSource ? new URL('./sourceThread.mjs', import.meta.url) : program;
  const started = new Worker(file, { execArgv: [], workerData: { program: program.href } });
  started.on('message', settle);
  started.on('error', (error: Error) => {
    if (thread === started) endThread(error);
  });
  started.on('exit', () => {
    if (thread === started) endThread(new Error('The thread that draws pages ended.'));
  });
  return started;
}

/** Draws in a thread of its own, so that nobody else's request waits for a page. */
export function inThread(task: PdfTask): Promise<Uint8Array | null> {
  clearTimeout(idle);
  thread ??= startThread();
  thread.ref();
  const current = thread;
  const id = (count += 1);
  return new Promise((resolve, reject) => {
    const timer = setTimeout(() => endThread(new Error('Drawing the page took too long.')), LONGEST_MS).unref();
    waiting.set(id, { resolve, reject, timer });
    current.postMessage({ id, task } satisfies PdfRequest);
  });
}
