import type { crib as english } from '../en/crib';
import type { SameKeys } from '../sameKeys';

/** Las llaves en palabras, y cada «no» en una frase (W3). */
export const crib: SameKeys<typeof english> = {
  kind: {
    setting: 'llave de disparo',
    dial: 'llave de esfera',
    torque: 'llave digital de par',
    torqueAngle: 'llave digital de par y ángulo',
    angleGauge: 'goniómetro',
    multiplier: 'multiplicador',
  },
  state: { inService: 'en servicio', quarantined: 'en cuarentena', away: 'fuera', retired: 'retirada' },
  direction: { cw: 'a derechas', ccw: 'a izquierdas' },
  range: '{low} – {high} {unit}',
  serial: 'n.º {serial}',
  due: 'vence hoy | vence en 1 día | vence en {n} días',
  lapsed: 'calibración vencida',
  no: {
    notInService: 'No está en servicio: {state}.',
    lapsed: 'Su calibración ha vencido ({due}).',
    wrongKind: 'No es para esto: {kind}.',
    turnNotMeasured: 'No mide el giro: {kind}.',
    noRange: 'No tiene alcance calibrado.',
    outOfRange:
      'La ventana {windowLow} – {windowHigh} {windowUnit} no cabe en su alcance {rangeLow} – {rangeHigh} {rangeUnit}.',
    endTorqueTooHigh: 'El giro puede acabar en {endTorque} {endTorqueUnit}; llega como mucho a {most} {rangeUnit}.',
    directionNotCalibrated: 'No está calibrada {direction}.',
    driveMismatch: 'Tiene cuadrado de {has}; hace falta {needs}.',
    tooCoarse: 'Es demasiado basta para esta ventana (relación {ratio}).',
    guardsLeaveTooLittle: 'Sus márgenes dejan solo el {percent} % de la ventana.',
    dropped: 'Se cayó en este recorrido.',
    overloaded: 'Se sobrecargó en este recorrido.',
    reachedLimit: 'Llegó aquí a su límite.',
  },
  short: {
    notInService: 'no está en servicio',
    lapsed: 'calibración vencida',
    wrongKind: 'no es para esto',
    turnNotMeasured: 'no mide el giro',
    noRange: 'sin alcance calibrado',
    outOfRange: 'la ventana no cabe en su alcance',
    endTorqueTooHigh: 'el giro puede pasar de su alcance',
    directionNotCalibrated: 'no calibrada en este sentido',
    driveMismatch: 'otro cuadrado',
    tooCoarse: 'demasiado basta',
    guardsLeaveTooLittle: 'queda poco entre sus márgenes',
    dropped: 'se cayó',
    overloaded: 'sobrecargada',
    reachedLimit: 'en su límite',
  },
  warning: {
    coarse: 'Apenas lo bastante fina (relación {ratio}).',
    driveAdapted: 'Con un adaptador de {has} a {needs}.',
    noDue: 'No tiene fecha de vencimiento.',
    noCertificate: 'No tiene certificado.',
  },
};
