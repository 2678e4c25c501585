/** What the tablet itself says no with: storage, the walk's log, sending. Merged into `errors` with the other areas. */
export const tabletErrors = {
  storage: {
    full: 'The disk of this tablet is full. Nothing was recorded; what was saved before is kept. Make room, then do it again.',
    lost: 'The browser lost its storage for a moment. Look at the last step shown, then go on from there.',
    blocked: 'An older version is open in another tab. Close that tab, then try again.',
    newerVersion: 'A newer version is open in another tab. Load this page again.',
    broken:
      'The storage of this tablet does not work. Nothing more is recorded. Export what can be read and use another tablet.',
    doubled: 'This step was saved already.',
    headMoved: 'Another tab wrote to this walk meanwhile. Look at the last step shown.',
    cleared: 'The storage of this tablet was cleared while the walk was open. Nothing more is recorded here.',
  },
  log: {
    readOnly: 'Another tab of this tablet is writing this walk. This one only shows it.',
    chainBroken:
      'The record on this tablet does not hold from event {seq} on. Nothing more is written to it. Export it and tell a supervisor.',
    sealFailed: 'The PIN could not be sealed: this tablet has no key of the shop yet.',
    textNotWritable: 'The text holds a character that cannot be kept. Type it again.',
    tooLong: 'This is too long for one entry.',
  },
  pin: {
    firstTime: 'The first sign-in on this tablet needs the server, and it does not answer.',
    offlineTooLong: 'This tablet has not reached the server for too long. Signing in needs it now.',
    clockSetBack: 'The clock of this tablet was set back. Signing in needs the server now.',
  },
  server: {
    unreachable: 'The server does not answer. Everything is kept on this tablet.',
    notOurs:
      'Something else answered in the server’s place, such as the log-in page of a network. Everything is kept on this tablet.',
    busy: 'The server is busy. It is tried again by itself.',
    ill: 'The server is in trouble. It is tried again by itself.',
  },
  receipt: {
    mismatch: 'The server’s receipt does not fit the record on this tablet. Nothing was removed. Tell a supervisor.',
    noProgress: 'The server took nothing and gave no reason. Nothing was removed.',
  },
  chain: {
    broken: 'The record that came from the server does not hold at event {seq}.',
    empty: 'The server has no event of this walk.',
    conflict:
      'The server holds other events of this walk than this tablet: it was walked on two tablets. A supervisor has to say which stands.',
    unsent: 'This tablet has events of this walk that were not sent yet. Send them first.',
    noProcedure: 'The procedure of this walk is not on this tablet yet.',
  },
  opening: {
    jointUnknown: 'This joint is not known to this tablet.',
    jobClosed: 'This job is closed.',
    noProcedure: 'There is no approved procedure for this joint.',
    noSettings: 'This tablet has not heard from the shop yet.',
  },
  order: {
    badSignature: 'An order came that the shop did not sign. It is not obeyed.',
    notHere: 'This order cannot be obeyed on this tablet.',
  },
  stand: { nobodySignedIn: 'Nobody is signed in.' },
};
