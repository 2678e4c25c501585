import type { officeCrib as en } from '../en/officeCrib';
import type { SameKeys } from '../sameKeys';

/** El pañol: cada llave, qué puede hacer y hasta cuándo. */
export const officeCrib: SameKeys<typeof en> = {
  crib: {
    title: 'Pañol',
    find: 'Etiqueta, serie, certificado',
    tag: 'llave',
    wrench: 'tipo',
    range: 'alcance, N·m',
    cw: 'horario',
    ccw: 'anti-horario',
    turn: 'giro',
    due: 'vence: fecha, ciclos',
    state: 'estado',
    stateIs: 'Estado',
    driveIs: 'Cuadradillo',
    unusable:
      'Hoy se pueden usar las {all} llaves. | Hoy no se puede usar una de {all} llaves. | Hoy no se pueden usar {n} de {all} llaves.',
    soon: 'Ninguna vence en {days} días. | Una vence en {days} días. | {n} vencen en {days} días.',
    notCounted: 'no cuenta',
    lapsedDays: 'venció hoy | venció hace 1 día | venció hace {n} días',
    lapsedCycles: 'ciclos agotados',
    days: 'hoy | 1 día | {n} días',
    cycles: 'ningún ciclo | queda 1 ciclo | quedan {n} ciclos',
    byDate: 'por fecha, {day}',
    byCycles: 'por ciclos',
    none: 'no',
    noDue: 'sin fecha',
    noCertificate: 'sin certificado',
    kind: {
      setting: 'de salto',
      dial: 'de esfera',
      torque: 'par',
      torqueAngle: 'par y giro',
      angleGauge: 'goniómetro',
      multiplier: 'multiplicador',
    },
    standing: {
      lapsed: 'vencida, no usar',
      quarantined: 'en cuarentena',
      away: 'fuera',
      soon: 'vence pronto',
      inService: 'en servicio',
      retired: 'retirada',
    },
    empty: { title: 'No hay llaves en el pañol', text: 'Sin llave ningún recorrido puede tomar lecturas.' },
  },
};
