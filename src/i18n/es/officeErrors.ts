import type { officeErrors as en } from '../en/officeErrors';
import type { SameKeys } from '../sameKeys';

/** Con qué dice que no el servidor a quien está en la oficina. */
export const officeErrors: SameKeys<typeof en> = {
  office: {
    unreachable: 'El servidor no contesta.',
    notOurs: 'La respuesta no vino del servidor del taller.',
    busy: 'El servidor está ocupado o tiene problemas.',
    mistake: 'Esta página ha cometido un error propio.',
  },
  server: { fault: 'El servidor ha tenido un fallo propio. Ha quedado anotado allí.' },
  rate: { tooMany: 'Demasiadas peticiones desde este lugar. Espere {wait}.' },
  request: { invalid: 'El servidor no pudo leer lo enviado (campo {field}).' },
  body: {
    tooLarge: 'Es demasiado para enviarlo de una vez.',
    notJson: 'El servidor no pudo leer lo enviado.',
    cut: 'La conexión se cortó antes de enviarlo todo.',
    unreadable: 'El servidor no pudo leer lo enviado.',
  },
  route: { unknown: 'El servidor no conoce esta dirección.' },
  session: { missing: 'Nadie ha iniciado sesión.', expired: 'Su sesión ha terminado.' },
  csrf: { wrong: 'Esta página es de una sesión anterior.' },
  right: { missing: 'Sus funciones no permiten esto.' },
  signIn: {
    refused: 'El correo o la contraseña no son correctos.',
    wait: 'Demasiadas contraseñas incorrectas seguidas. Espere {wait}.',
    whichShop: 'Esta dirección vale en varios talleres.',
  },
  shop: { unknown: 'Ese taller no existe.' },
  person: {
    unknown: 'Esa persona no existe.',
    leftAlready: 'Esta persona ya se había ido.',
    yourself: 'No puede darse de baja a sí mismo.',
  },
  pin: {
    wrong: 'El PIN no es correcto.',
    wait: 'Demasiados PIN incorrectos seguidos. Espere {wait}.',
    notSet: 'Todavía no ha puesto un PIN: hágalo en «Su PIN».',
    personLeft: 'Esta persona ya no está en el taller.',
    personUnknown: 'Este taller no conoce a esa persona.',
    trivial: 'Este PIN es demasiado fácil de adivinar.',
    sixDigits: 'Un PIN tiene seis cifras.',
  },
  pinUse: { unknown: 'No hay tal uso de su PIN.', answered: 'Ya respondió por este uso.' },
  job: {
    unknown: 'Ese trabajo no existe.',
    numberTaken: 'Otro trabajo tiene ya el número {number}.',
    closed: 'Este trabajo está cerrado: ábralo primero.',
    walksOpen: 'Una unión de este trabajo no está terminada: no se puede cerrar.',
  },
  procedure: { unknown: 'Ese procedimiento no existe.' },
  vin: {
    letters: 'Ningún VIN lleva las letras I, O y Q.',
    length: 'Un VIN tiene 17 caracteres.',
    characters: 'Un VIN lleva solo letras y cifras.',
  },
  walk: {
    unknown: 'Ese recorrido no existe.',
    headMoved: 'El registro ha cambiado desde que lo miró.',
    notReleased: 'Una tableta todavía escribe este recorrido: dé una orden en su lugar.',
    heldElsewhere: 'Otra tableta escribe este recorrido.',
    notForked: 'Este recorrido tiene una sola rama.',
    broken: 'El registro guardado no se verifica desde el evento {seq}: sobre él no se firma ni se emite nada.',
  },
  order: {
    incomplete: 'A la orden le falta de qué trata.',
    notOffered: 'Las reglas de reparación no ofrecen esto aquí.',
  },
  quarantine: { unknown: 'No hay tal evento rechazado.' },
  proof: {
    unknown: 'Esa prueba no existe.',
    blocked: 'Todavía no se puede emitir una prueba.',
    notInForce: 'Esta prueba ya no está en vigor.',
    documentBroken:
      'El documento guardado de esta prueba ya no se puede leer: no se imprime nada. Recupérelo de una copia.',
    alreadyIssued: 'La prueba {number} de este registro ya se emitió y nada ha cambiado desde entonces.',
    notIssuable: 'Solo un montaje final o un repaso tienen prueba; este recorrido tenía otro fin.',
    voided: 'El recorrido fue anulado.',
    notSigned: 'No han firmado todos los que apretaron o anotaron.',
    notCountersigned: 'Falta la segunda firma.',
    notReleased: 'La tableta todavía tiene el recorrido: sus últimos eventos no han llegado.',
    confirmationMissing: 'El PIN de una firma aún no se ha comprobado: la tableta tiene que enviarlo.',
    confirmationRefused:
      'El PIN de una firma fue rechazado o no reconocido: la persona firma otra vez, o decide otro encargado.',
    quarantined: 'Las reglas rechazaron eventos de este recorrido: un encargado tiene que mirarlos.',
    forked: 'Dos tabletas escribieron este recorrido: un encargado tiene que decir qué registro vale.',
    blobsMissing: 'Aún no han llegado fotos que el registro nombra: {files}.',
    workOpen: 'El trabajo no está terminado.',
    procedureMismatch: 'El registro se hizo con otro texto del procedimiento.',
  },
  tablet: {
    unknown: 'Esa tableta no existe.',
    revoked: 'Esta tableta fue dada de baja.',
    alreadyRevoked: 'Esta tableta ya estaba dada de baja.',
  },
};
