/** Words of the shell, in English. Another language is another object of this type. */
export const en = {
  lang: 'en',
  product: 'Stillair',
  skip: 'Skip to the content',
  mainNavigation: 'Main',
  signOut: 'Sign out',
  signedInAs: 'Signed in as',
  footer: 'Stillair informs a decision. Local codes, the venue and licensed practice decide.',
  errorSummary: 'Please correct the following',
  errorPrefix: 'Error:',
  roles: {
    coordinator: 'Coordinator',
    reviewer: 'Reviewer',
    presenter: 'Presenter',
    administrator: 'Administrator',
  },
  decisions: {
    go: 'Go',
    goWithConditions: 'Go with conditions',
    noGo: 'No-go',
    notEnoughKnown: 'Not enough known',
  },
  origins: {
    measured: 'Measured',
    drawing: 'From a drawing',
    supplied: 'Supplied by the venue',
    assumed: 'Assumed',
    unknown: 'Don\u2019t know',
  },
  figure: {
    value: 'Value',
    notStated: 'Not stated',
    more: 'Bounds, date, by whom, note',
    note: 'Note',
    low: 'Lowest it may be',
    high: 'Highest it may be',
    origin: 'Where it comes from',
    on: 'Date',
    by: 'By whom (role or company)',
    explain: 'How this figure comes about',
    formula: 'Formula',
    method: 'Method',
    inputs: 'Inputs',
    source: 'Source',
    range: 'Holds for',
    span: 'Between',
  },
  notices: {
    saved: 'Saved.',
    created: 'Created.',
    deleted: 'Deleted.',
    signedOut: 'You are signed out.',
    welcome: 'Your account is ready and you are signed in.',
  },
  home: {
    title: 'Home',
    intro: 'Plan a gas demonstration, in numbers, before anybody opens a valve.',
  },
  signIn: {
    title: 'Sign in',
    email: 'Email',
    password: 'Password',
    button: 'Sign in',
    refused: 'The email or the password is not right.',
    refusedHint: 'Check both. An administrator can set a new password.',
    noAccountYet:
      'There is no account yet. The terminal that runs Stillair prints a link that creates the first one.',
  },
  firstLink: {
    title: 'Create the administrator',
    intro: 'This link works once. The account made here can add people and change every setting.',
    name: 'Your name',
    email: 'Email',
    emailHint: 'You sign in with it. Stillair sends no mail.',
    password: 'Password',
    passwordHint: 'At least 10 characters. A few unrelated words are easy to keep in mind.',
    passwordAgain: 'Password again',
    button: 'Create the account',
  },
  account: {
    title: 'Your account',
    name: 'Name',
    email: 'Email',
    role: 'Role',
    people: 'People with an account',
  },
  errors: {
    title: 'That did not work',
    notFound: 'There is nothing here',
    notAllowed: 'Not allowed',
    conflict: 'Somebody else was quicker',
    fault: 'A fault on our side',
    whatNext: 'What to do next',
    details: 'Where',
    backHome: 'Go to the home page',
    noPage: 'There is no page at this address.',
    noPageHint: 'Check the address, or start from the home page.',
    faultMessage:
      'Stillair met a fault of its own and stopped this request. What was saved before is safe.',
    faultHint: 'Try again. If it happens once more, report it with this reference:',
    tooLarge: 'What was sent is larger than 1 MB, so none of it was read.',
    tooLargeHint: 'Send less at once. A plan or a venue never needs that much.',
    tooMany: 'Too many tries in a short time.',
    tooManyHint: 'Wait a few minutes, then try again.',
    unreadable: 'What was sent could not be read.',
    unreadableHint: 'Send JSON or a form, complete and well formed.',
    wrongKind: 'This address does not take what was sent.',
    wrongKindHint: 'Send JSON (content-type application/json) or a form.',
  },
} as const;

export type NoticeName = keyof typeof en.notices;

/** The notice that a redirect named, if it is one of ours: an address cannot put words on a page. */
export function noticeNamed(name: unknown): NoticeName | undefined {
  return typeof name === 'string' && Object.hasOwn(en.notices, name)
    ? (name as NoticeName)
    : undefined;
}
