import { webcrypto } from 'node:crypto';
import { parentPort } from 'node:worker_threads';
import { recordCryptoFrom } from '@shared/record/recordCryptoFrom';
import { drawProofPdf, type PdfJob } from './drawProofPdf';
import { printProof, type PrintJob } from './printProof';

/** What the thread is asked for: to draw a document, or to check a sealed proof and print it. */
export type PdfTask = { kind: 'draw'; job: PdfJob } | { kind: 'print'; job: PrintJob };

/** One task; `id` comes back with the answer. */
export interface PdfRequest {
  id: number;
  task: PdfTask;
}

/** The bytes (null: not to be read), or why there are none. */
export type PdfAnswer = { id: number; bytes: Uint8Array | null } | { id: number; error: string };

const crypto = recordCryptoFrom(webcrypto.subtle);

const run = (task: PdfTask): Promise<Uint8Array | null> =>
  task.kind === 'draw' ? drawProofPdf(task.job) : printProof(task.job, crypto);

parentPort?.on('message', ({ id, task }: PdfRequest) => {
  run(task).then(
    (bytes) => parentPort?.postMessage({ id, bytes } satisfies PdfAnswer),
    (error: unknown) => {
      const message = error instanceof Error ? (error.stack ?? error.message) : String(error);
      parentPort?.postMessage({ id, error: message } satisfies PdfAnswer);
    },
  );
});
