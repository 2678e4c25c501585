import type { cautions as english } from '../en/cautions';
import type { SameKeys } from '../sameKeys';

/** Precauciones del oficio, donde hacen falta. */
export const cautions: SameKeys<typeof english> = {
  eyes: 'Use gafas de protección.',
  support: 'Sujete bien la pieza antes de tirar.',
  coldJoint: 'Afloje una unión solo en frío.',
  noBreaker: 'La llave dinamométrica no es para aflojar: use otra herramienta.',
  noImpact: 'Nada de pistolas de impacto en una etapa que se juzga.',
  grip: 'La mano en la marca del mango. Sin tubo en el mango.',
  smoothPull: 'Un solo tirón suave, y termine en movimiento.',
  noUniversal: 'Sin junta cardán en una lectura que se juzga.',
  range: 'Nunca fuera del alcance de la llave.',
  layStill: 'Deje la llave quieta antes de ponerla a cero para un giro.',
  usedOnce: 'No vuelva a montar un tornillo de un solo uso ya usado.',
  clickIsNoMeasure: 'Un clic no es una medida.',
  manualFirst:
    'El manual vigente del fabricante del motor, las normas locales y el criterio de un técnico cualificado van primero: este programa no los sustituye.',
};
