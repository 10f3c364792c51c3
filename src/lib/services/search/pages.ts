import { type Role } from '#db/queries/users';

/** A page that can be found by its name or by other words for it. */
export interface FindablePage {
  label: string;
  /** Other words that people may look for. */
  terms: string;
  /** Path within the network, or from the root where it begins with `/`. */
  path: string;
  /** Who may open it: anybody of the network where left out. */
  roles?: readonly Role[];
  isForAdministrators?: boolean;
}

const OPERATOR: readonly Role[] = ['operator'];
const LIAISON: readonly Role[] = ['liaison'];

export const FINDABLE_PAGES: readonly FindablePage[] = [
  { label: 'Map', terms: 'now overview place', path: 'map' },
  { label: 'Stations', terms: 'monitors', path: 'stations' },
  { label: 'Register a station', terms: 'new add monitor', path: 'stations/new', roles: OPERATOR },
  { label: 'Health', terms: 'silent battery clock trouble coverage', path: 'health' },
  { label: 'Health settings', terms: 'thresholds alerts', path: 'health/settings' },
  { label: 'Exceedances', terms: 'alerts over limit loud', path: 'exceedances' },
  { label: 'This spectrum elsewhere', terms: 'alike shape find sound', path: 'spectra/search' },
  { label: 'Complaints', terms: 'residents cases reply', path: 'complaints' },
  { label: 'Log a complaint', terms: 'new add resident', path: 'complaints/new', roles: LIAISON },
  { label: 'Letters', terms: 'templates answers approval reply', path: 'complaints/letters', roles: LIAISON },
  { label: 'Residents’ form', terms: 'report public complaint', path: 'complaints/form', roles: LIAISON },
  { label: 'Calendar of complaints', terms: 'month nights levels', path: 'complaints/calendar' },
  {
    label: 'Numbers of complaints',
    terms: 'statistics counts answer time measure',
    path: 'complaints/numbers',
  },
  {
    label: 'Desk settings',
    terms: 'working days due reminders retention privacy complaints',
    path: 'complaints/settings',
    roles: LIAISON,
  },
  { label: 'Summaries', terms: 'monthly report months pdf', path: 'summaries' },
  { label: 'Trend and comparison', terms: 'months years Lden compare summaries', path: 'summaries/compare' },
  {
    label: 'How summaries are made',
    terms: 'template mark text language grace monthly report',
    path: 'summaries/settings',
    roles: OPERATOR,
  },
  { label: 'Months of your networks', terms: 'summaries desk regulator issued', path: '/summaries' },
  { label: 'Check a file', terms: 'verify seal digest signature issued', path: '/verify' },
  { label: 'Limits', terms: 'thresholds', path: 'limits' },
  { label: 'Holidays', terms: 'named dates sundays limits', path: 'limits/holidays' },
  { label: 'Station groups', terms: 'group stations limits', path: 'limits/groups' },
  { label: 'Set a limit', terms: 'new add threshold', path: 'limits/new', roles: OPERATOR },
  { label: 'Try a limit', terms: 'trial past threshold', path: 'limits/trial', roles: OPERATOR },
  { label: 'Alerts', terms: 'e-mail digest quiet hours notifications', path: 'alerts' },
  {
    label: 'Escalation',
    terms: 'nobody acknowledges alerts on call',
    path: 'alerts/escalation',
    roles: OPERATOR,
  },
  { label: 'E-mails', terms: 'outbox sent failed resend', path: 'alerts/mails', roles: OPERATOR },
  { label: 'Exclusions', terms: 'invalid left out periods', path: 'exclusions' },
  { label: 'Exclude a period', terms: 'leave out exclusion new', path: 'exclusions/new', roles: OPERATOR },
  { label: 'Plant', terms: 'fans pumps engines machines sources', path: 'plants' },
  { label: 'Add a plant', terms: 'new machine source', path: 'plants/new', roles: OPERATOR },
  { label: 'What could it be?', terms: 'plant candidates tone cause', path: 'plants/candidates' },
  { label: 'Operations', terms: 'activities log noted', path: 'activities' },
  { label: 'Note an activity', terms: 'new operation', path: 'activities/new', roles: OPERATOR },
  { label: 'With and without', terms: 'compare activities operations', path: 'activities/compare' },
  { label: 'Instruments', terms: 'meters microphones calibration deployments', path: 'instruments' },
  { label: 'Add an instrument', terms: 'new meter', path: 'instruments/new', roles: OPERATOR },
  { label: 'Calibration settings', terms: 'instruments checks due', path: 'instruments/settings' },
  { label: 'Weather', terms: 'wind masts rain direction anemometer', path: 'weather' },
  { label: 'Add a mast', terms: 'new weather wind anemometer', path: 'weather/new', roles: OPERATOR },
  { label: 'Imports', terms: 'upload file backfill outage', path: 'imports' },
  { label: 'Bring a file', terms: 'import upload new backfill', path: 'imports/new', roles: OPERATOR },
  { label: 'Quarantine', terms: 'refused records conflict', path: 'quarantine' },
  { label: 'Network settings', terms: 'periods zone wind rain coverage', path: 'settings' },
  { label: 'Your account', terms: 'password sessions access tokens sign out', path: '/account' },
  {
    label: 'Second factor',
    terms: 'authenticator codes recovery two-step sign in',
    path: '/account/second-factor',
  },
  { label: 'Administration', terms: 'admin', path: '/admin', isForAdministrators: true },
  {
    label: 'People',
    terms: 'users roles members invitations',
    path: '/admin/people',
    isForAdministrators: true,
  },
  {
    label: 'Invite a person',
    terms: 'new add user member e-mail',
    path: '/admin/people/invite',
    isForAdministrators: true,
  },
  { label: 'Networks', terms: 'all', path: '/admin/networks', isForAdministrators: true },
  { label: 'Audit trail', terms: 'log changes who', path: '/admin/audit', isForAdministrators: true },
  { label: 'Design', terms: 'colours type components', path: '/design', isForAdministrators: true },
];
