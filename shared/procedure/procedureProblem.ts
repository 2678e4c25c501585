/** Everything that can be wrong with a procedure document, one code for each kind of mistake; translated on screens. */
export type ProcedureProblemCode =
  | 'badShape'
  | 'idRepeats'
  | 'labelRepeats'
  | 'holesOnOneSpot'
  | 'groupUnknown'
  | 'fastenerUnknown'
  | 'holeUnknown'
  | 'holeRepeats'
  | 'holeInNoPass'
  | 'looseningIncomplete'
  | 'windowMissing'
  | 'windowWrongUnit'
  | 'windowMalformed'
  | 'windowNotPositive'
  | 'windowLimitsCross'
  | 'windowNoWidth'
  | 'windowTargetOutside'
  | 'endTorqueUnused'
  | 'monitorLimitsCross'
  | 'repeatNotTorque'
  | 'repeatAfterTurn'
  | 'checkAfterTurn'
  | 'usedFromUnknown'
  | 'usedFromNotTaken'
  | 'passUnknown'
  | 'measureWithoutWindow';

/** One thing wrong and where: `path` names the member, `passes.2.stages.0.windows.B`; `about` the id or label concerned. */
export interface ProcedureProblem {
  code: ProcedureProblemCode;
  path: string;
  about?: string;
}
