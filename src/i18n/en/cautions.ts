/** Cautions of the trade, shown where they apply. */
export const cautions = {
  eyes: 'Wear eye protection.',
  support: 'Support the work before you pull.',
  coldJoint: 'Loosen a joint only when it is cold.',
  noBreaker: 'A torque wrench is no breaker bar: loosen with another tool.',
  noImpact: 'No impact tools on a judged stage.',
  grip: 'Hand on the grip mark. No pipe on the handle.',
  smoothPull: 'One smooth pull, and finish while it is moving.',
  noUniversal: 'No universal joint in a judged reading.',
  range: 'Never beyond the range of the wrench.',
  layStill: 'Lay the wrench still before zeroing it for a turn.',
  usedOnce: 'Never fit a used single-use fastener again.',
  clickIsNoMeasure: 'A click is not a measurement.',
  manualFirst:
    'The engine maker’s current manual, local rules and the judgement of a qualified technician come first: this program does not replace them.',
};
