/** Cautions of the trade: keys of the `cautions` messages. */
export type CautionName =
  | 'eyes'
  | 'support'
  | 'coldJoint'
  | 'noBreaker'
  | 'noImpact'
  | 'grip'
  | 'smoothPull'
  | 'noUniversal'
  | 'range'
  | 'layStill'
  | 'usedOnce'
  | 'clickIsNoMeasure'
  | 'manualFirst';
