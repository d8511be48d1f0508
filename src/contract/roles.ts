/** Roles of a person in one workshop, strongest first. */
export const ROLES = ['owner', 'instructor', 'technician', 'learner'] as const;
export type Role = (typeof ROLES)[number];

/** What a personal token may be used for; `manage` covers people, workshop and tokens' own list. */
export const SCOPES = ['read', 'write', 'manage'] as const;
export type Scope = (typeof SCOPES)[number];

/** A cell of the access table. `own`: only for things the person made; `set`: those, and what is set for them. */
export type Grant = 'yes' | 'own' | 'set' | 'no';

/** What a holder of a share link may do with the endpoint: not at all, look, or answer (when the link allows it). */
export type ShareGrant = 'no' | 'look' | 'answer';

export interface AccessRow {
  readonly owner: Grant;
  readonly instructor: Grant;
  readonly technician: Grant;
  readonly learner: Grant;
  /** Token scope needed; `none`: tokens are refused whatever their scope. */
  readonly scope: Scope | 'none';
  readonly share: ShareGrant;
  /** Open to a caller who is nobody (sign-in, health, the API's own description). */
  readonly nobody: boolean;
}

const row = (
  owner: Grant,
  instructor: Grant,
  technician: Grant,
  learner: Grant,
  scope: Scope | 'none',
): AccessRow => ({ owner, instructor, technician, learner, scope, share: 'no', nobody: false });

/** The rows of the access table in words; each endpoint names one. */
export const ACCESS = {
  /** See the workshop's captures, known-goods, comparisons; a learner own practice captures and what is set for them. */
  see: row('yes', 'yes', 'yes', 'set', 'read'),
  /** Upload: a learner's upload becomes an own practice capture. */
  upload: row('yes', 'yes', 'yes', 'own', 'write'),
  /** Change, mark, share. */
  change: row('yes', 'yes', 'yes', 'own', 'write'),
  /** Delete: a technician only what they made. */
  remove: row('yes', 'yes', 'own', 'own', 'write'),
  /** What a learner has no part in. */
  seeStaff: row('yes', 'yes', 'yes', 'no', 'read'),
  /** Change what a learner has no part in. */
  changeStaff: row('yes', 'yes', 'yes', 'no', 'write'),
  /** The same for deleting: a technician only what they made. */
  removeStaff: row('yes', 'yes', 'own', 'no', 'write'),
  propose: row('yes', 'yes', 'yes', 'no', 'write'),
  review: row('yes', 'yes', 'no', 'no', 'write'),
  teach: row('yes', 'yes', 'no', 'no', 'write'),
  /** Results of others. */
  seeTeach: row('yes', 'yes', 'no', 'no', 'read'),
  attempt: row('yes', 'yes', 'yes', 'yes', 'write'),
  manage: row('yes', 'no', 'no', 'no', 'manage'),
  seeManage: row('yes', 'no', 'no', 'no', 'manage'),
  /** The owner's own doing: no token exports or ends a workshop. */
  selfManage: row('yes', 'no', 'no', 'no', 'none'),
  self: row('yes', 'yes', 'yes', 'yes', 'read'),
  selfWrite: row('yes', 'yes', 'yes', 'yes', 'write'),
  /** Own sign-in matters: tokens cannot be made or changed with a token. */
  selfSession: row('yes', 'yes', 'yes', 'yes', 'none'),
  open: {
    owner: 'yes',
    instructor: 'yes',
    technician: 'yes',
    learner: 'yes',
    scope: 'read',
    share: 'no',
    nobody: true,
  },
  shareLook: {
    owner: 'no',
    instructor: 'no',
    technician: 'no',
    learner: 'no',
    scope: 'none',
    share: 'look',
    nobody: false,
  },
  shareAnswer: {
    owner: 'no',
    instructor: 'no',
    technician: 'no',
    learner: 'no',
    scope: 'none',
    share: 'answer',
    nobody: false,
  },
} as const satisfies Record<string, AccessRow>;

export type AccessName = keyof typeof ACCESS;
