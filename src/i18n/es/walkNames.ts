import type { walkNames as english } from '../en/walkNames';
import type { SameKeys } from '../sameKeys';

/** Nombres de las cosas de un recorrido: elementos, etapas, pasadas, fuentes, personas. */
export const walkNames: SameKeys<typeof english> = {
  noun: {
    bolt: {
      name: 'Tornillo',
      many: 'tornillos',
      the: 'el tornillo {label}',
      title: 'Tornillo {label}',
      fresh: 'un tornillo nuevo',
    },
    stud: {
      name: 'Espárrago',
      many: 'espárragos',
      the: 'el espárrago {label}',
      title: 'Espárrago {label}',
      fresh: 'un espárrago nuevo',
    },
    nut: {
      name: 'Tuerca',
      many: 'tuercas',
      the: 'la tuerca {label}',
      title: 'Tuerca {label}',
      fresh: 'una tuerca nueva',
    },
    capScrew: {
      name: 'Tornillo Allen',
      many: 'tornillos Allen',
      the: 'el tornillo Allen {label}',
      title: 'Tornillo Allen {label}',
      fresh: 'un tornillo Allen nuevo',
    },
  },
  joint: { the: 'la unión', title: 'La unión' },
  unknownPerson: 'alguien desconocido aquí',
  head: { job: 'Trabajo {number}', engine: 'motor {serial}', revision: '{code} rev {revision}' },
  stage: {
    turn: 'giro {target}',
    runDown: 'enroscar a mano',
    loosen: { quarter: 'aflojar un cuarto de vuelta', free: 'aflojar del todo', breakLoose: 'despegar' },
    check: {
      firstMovement: 'control: primer movimiento',
      breakLoose: 'control: par de despegue',
      markAndReturn: 'control: marcar y volver',
      witnessMark: 'marcas testigo a la vista',
    },
  },
  pass: {
    title: '{number} · {words}',
    marks: 'marcas testigo a la vista',
    strip: 'par de despegue',
    allIn: 'los {n} dentro',
    done: '{n} hechos',
    begun: '{n} hechos',
    notBegun: 'sin empezar',
  },
  tag: {
    fresh: 'nuevo',
    nth: '{n}.º',
    ordinal: {
      n1: '1.º',
      n2: '2.º',
      n3: '3.º',
      n4: '4.º',
      n5: '5.º',
      n6: '6.º',
      n7: '7.º',
      n8: '8.º',
      n9: '9.º',
      n10: '10.º',
    },
  },
  source: {
    streamed: 'enviado por la llave',
    keyed: 'escrito por la llave',
    typed: 'escrito a mano',
    clicked: 'clic',
    gauged: 'goniómetro',
    marked: 'por la raya',
    paper: 'de papel',
    simulated: 'simulado',
  },
  meaning: {
    tightenedAsRecorded: 'He apretado esta unión como consta aquí.',
    recordedAsTold: 'He anotado lo que me han dicho.',
    checkedRecord: 'He comprobado este registro.',
    checkedRecordAndJoint: 'He comprobado este registro y he visto la unión abierta antes de taparla.',
  },
  doNotRun: 'Sin terminar: no arrancar',
  doNotRunText: 'La unión no está hecha. No arranque el motor ni tape la unión.',
  doNotRunSigned: 'Hasta que esté firmado y, donde el taller lo pide, refrendado.',
  broken: 'El registro de esta tableta no es válido desde la entrada {seq}',
  brokenText:
    'No se escribe nada más en él. Lo legible se puede exportar desde «Qué hay en esta tableta». Avise a un supervisor.',
  readOnly: 'Otra ventana de esta tableta escribe este recorrido',
  readOnlyText: 'Aquí solo puede mirar. Cierre la otra ventana para seguir aquí.',
};
