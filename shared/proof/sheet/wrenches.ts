import { isLapsed } from '../../crib/due';
import type { ReadingRecord } from '../../walk/state';
import type { WrenchTaken } from '../../walk/events';
import type { ProofWrench } from '../sheet';
import type { SheetSource } from './source';

interface Taking {
  seq: number;
  by: string;
  data: WrenchTaken;
}

/** The taking in force when a reading was taken: its snapshot is what was known then (J7). */
const takingFor = (takings: readonly Taking[], record: ReadingRecord): Taking | undefined =>
  takings.filter(({ seq }) => seq < record.seq).at(-1);

function wrenchRow(source: SheetSource, id: string, takings: readonly Taking[]): ProofWrench[] {
  const { state } = source;
  const last = takings.at(-1);
  if (!last) return [];
  const { wrench } = last.data;
  const readings = state.readings.filter(({ data, status }) => data.wrench === id && status !== 'voided');
  const lapsed = (record: ReadingRecord): boolean =>
    isLapsed((takingFor(takings, record) ?? last).data.wrench, record.data.pulledAt ?? record.at);
  const override = takings.findLast(({ data }) => data.override !== undefined);
  return [
    {
      tag: wrench.tag,
      serial: wrench.serial,
      drive: wrench.drive,
      certificate: wrench.certificate,
      due: { date: wrench.due.date, cycles: wrench.due.cycles },
      inDate: !readings.some(lapsed),
      how: takings.every(({ data }) => data.how === 'scanned') ? 'scanned' : 'picked',
      allowedBy: override?.by ?? null,
      adapters: [...new Set(takings.flatMap(({ data }) => (data.adapter ? [data.adapter.tag] : [])))],
      readings: readings.length,
      out: state.wrenches[id]?.out ?? null,
    },
  ];
}

/** Wrenches with serial, certificate, due, in date at every use, picked or scanned (D2); those never read with are left out. */
export function sheetWrenches(source: SheetSource): ProofWrench[] {
  const takings = new Map<string, Taking[]>();
  for (const event of source.events) {
    if (event.type !== 'wrench.taken') continue;
    const { id } = event.data.wrench;
    takings.set(id, [...(takings.get(id) ?? []), { seq: event.seq, by: event.by, data: event.data }]);
  }
  return [...takings]
    .flatMap(([id, list]) => wrenchRow(source, id, list))
    .filter(({ readings, out, allowedBy }) => readings > 0 || out !== null || allowedBy !== null);
}
