/** Lo que la propia tableta rechaza: memoria, registro del recorrido, envío. */
export const tabletErrors = {
  storage: {
    full: 'La memoria de esta tableta está llena. No se ha registrado nada; lo guardado antes se conserva. Haga sitio y repítalo.',
    lost: 'El navegador perdió su memoria por un momento. Mire el último paso mostrado y siga desde ahí.',
    blocked: 'Hay una versión anterior abierta en otra pestaña. Ciérrela e inténtelo de nuevo.',
    newerVersion: 'Hay una versión más nueva abierta en otra pestaña. Vuelva a cargar esta página.',
    broken:
      'La memoria de esta tableta no funciona. Ya no se registra nada. Exporte lo que se pueda leer y use otra tableta.',
    doubled: 'Este paso ya estaba guardado.',
    headMoved: 'Otra pestaña ha escrito mientras tanto en este recorrido. Mire el último paso mostrado.',
    cleared: 'La memoria de esta tableta se borró con el recorrido abierto. Aquí ya no se registra nada.',
  },
  log: {
    readOnly: 'Otra pestaña de esta tableta está escribiendo este recorrido. Esta solo lo muestra.',
    chainBroken:
      'El registro de esta tableta no es válido a partir del suceso {seq}. Ya no se escribe en él. Expórtelo y avise a un supervisor.',
    sealFailed: 'No se pudo sellar el PIN: esta tableta aún no tiene la clave del taller.',
    textNotWritable: 'El texto contiene un carácter que no se puede guardar. Escríbalo de nuevo.',
    tooLong: 'Es demasiado largo para una sola entrada.',
  },
  pin: {
    firstTime: 'La primera entrada en esta tableta necesita el servidor, y no responde.',
    offlineTooLong: 'Esta tableta lleva demasiado tiempo sin el servidor. Ahora hace falta para entrar.',
    clockSetBack: 'El reloj de esta tableta se ha atrasado. Ahora hace falta el servidor para entrar.',
  },
  server: {
    unreachable: 'El servidor no responde. Todo queda guardado en esta tableta.',
    notOurs:
      'Ha respondido otra cosa en lugar del servidor, por ejemplo la página de acceso de una red. Todo queda guardado en esta tableta.',
    busy: 'El servidor está ocupado. Se volverá a intentar solo.',
    ill: 'El servidor tiene problemas. Se volverá a intentar solo.',
  },
  receipt: {
    mismatch:
      'El recibo del servidor no corresponde al registro de esta tableta. No se ha quitado nada. Avise a un supervisor.',
    noProgress: 'El servidor no ha aceptado nada ni ha dicho por qué. No se ha quitado nada.',
  },
  chain: {
    broken: 'El registro recibido del servidor no es válido en el suceso {seq}.',
    empty: 'El servidor no tiene ningún suceso de este recorrido.',
    conflict:
      'El servidor tiene otros sucesos de este recorrido que esta tableta: se recorrió en dos tabletas. Un supervisor debe decir cuál vale.',
    unsent: 'Esta tableta tiene sucesos de este recorrido sin enviar. Envíelos primero.',
    noProcedure: 'El procedimiento de este recorrido aún no está en esta tableta.',
  },
  opening: {
    jointUnknown: 'Esta tableta no conoce esta junta.',
    jobClosed: 'Este trabajo está cerrado.',
    noProcedure: 'No hay ningún procedimiento aprobado para esta junta.',
    noSettings: 'Esta tableta aún no ha recibido nada del taller.',
  },
  order: {
    badSignature: 'Ha llegado una orden que el taller no firmó. No se cumple.',
    notHere: 'Esta orden no se puede cumplir en esta tableta.',
  },
  stand: { nobodySignedIn: 'No ha entrado nadie.' },
};
