import { parentPort } from 'node:worker_threads';
import { drawProofPdf, type PdfJob } from './drawProofPdf';

/** One job for the thread that draws; `id` comes back with the answer. */
export interface PdfRequest {
  id: number;
  job: PdfJob;
}

/** The bytes, or why there are none. */
export type PdfAnswer = { id: number; bytes: Uint8Array } | { id: number; error: string };

parentPort?.on('message', ({ id, job }: PdfRequest) => {
  drawProofPdf(job).then(
    (bytes) => parentPort?.postMessage({ id, bytes } satisfies PdfAnswer),
    (error: unknown) => {
      const message = error instanceof Error ? (error.stack ?? error.message) : String(error);
      parentPort?.postMessage({ id, error: message } satisfies PdfAnswer);
    },
  );
});
