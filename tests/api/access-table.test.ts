import { describe, expect, it } from 'vitest';
import { ACTIONS } from '../../src/contract/actions.ts';
import { ENDPOINTS } from '../../src/contract/endpoints.ts';
import { PAGE_OPENS, PAGES } from '../../src/contract/pages.ts';
import { ACCESS, type AccessName, ROLES } from '../../src/contract/roles.ts';

/**
 * The table of who may do what, written out once more by hand from the product's rules on security, so that a change of a
 * row shows here. Columns: owner, instructor, technician, learner; y yes, o own, s own and
 * what is set for them, n no.
 */
const ROWS: Readonly<Record<AccessName, string>> = {
  see: 'yyys',
  upload: 'yyyo',
  change: 'yyyo',
  remove: 'yyoo',
  seeStaff: 'yyyn',
  changeStaff: 'yyyn',
  removeStaff: 'yyon',
  propose: 'yyyn',
  review: 'yynn',
  teach: 'yynn',
  seeTeach: 'yynn',
  attempt: 'yyyy',
  manage: 'ynnn',
  seeManage: 'ynnn',
  selfManage: 'ynnn',
  self: 'yyyy',
  selfWrite: 'yyyy',
  selfSession: 'yyyy',
  open: 'yyyy',
  shareLook: 'nnnn',
  shareAnswer: 'nnnn',
};

describe('the access table', () => {
  it.each(Object.entries(ROWS))('%s is %s for owner, instructor, technician, learner', (name, row) => {
    const found = ACCESS[name as AccessName];
    expect(ROLES.map((role) => found[role][0]).join('')).toBe(row);
  });

  it('opens to nobody only what is open, and to links only what is for links', () => {
    const forNobody = Object.entries(ENDPOINTS).filter(([, row]) => ACCESS[row.access].nobody);
    expect(forNobody.map(([id]) => id).sort()).toEqual([
      'health',
      'invitations.accept',
      'openapi',
      'session.askReset',
      'session.code',
      'session.confirmEmail',
      'session.confirmSignUp',
      'session.reset',
      'session.signIn',
      'session.signUp',
    ]);
    const forLinks = Object.entries(ENDPOINTS).filter(([, row]) => ACCESS[row.access].share !== 'no');
    expect(
      forLinks.every(([id, row]) => id.startsWith('shared.') && row.path.startsWith('/shared/{secret}')),
    ).toBe(true);
  });

  it('lets no token make or end tokens, or change how one signs in', () => {
    for (const id of [
      'tokens.create',
      'tokens.list',
      'tokens.delete',
      'session.signOut',
      'me.workshop',
      'me.patch',
      'me.password',
      'me.email',
      'me.erase',
      'me.leave',
      'sessions.list',
      'sessions.delete',
      'sessions.deleteOthers',
      'secondStep.get',
      'secondStep.begin',
      'secondStep.confirm',
      'secondStep.renewCodes',
      'secondStep.end',
      'workshop.end',
      'workshop.keep',
      'workshop.export',
      'workshop.import',
    ] as const)
      expect(ACCESS[ENDPOINTS[id].access].scope, id).toBe('none');
  });

  it('needs more than the scope read for everything that changes something', () => {
    /** A POST that only asks: its question is too long for an address. */
    const asks = ['captures.nearest'];
    for (const [id, row] of Object.entries(ENDPOINTS)) {
      const access = ACCESS[row.access];
      if (row.method === 'GET' || row.method === 'HEAD' || access.nobody || access.share !== 'no') continue;
      if (asks.includes(id)) continue;
      expect(access.scope, id).not.toBe('read');
    }
  });

  it('opens every thing that a path names by id through the door, people and own tokens and uploads excepted', () => {
    const exempt = [
      'people.patch',
      'people.remove',
      'sessions.delete',
      'tokens.delete',
      'uploads.head',
      'uploads.patch',
      'uploads.delete',
    ];
    for (const [id, row] of Object.entries(ENDPOINTS))
      if (row.path.includes('{id}') && !exempt.includes(id)) expect('opens' in row, id).toBe(true);
  });

  it('has every page of one thing opened through the door', () => {
    for (const path of Object.keys(PAGES))
      if (path.includes('{id}')) expect(Object.keys(PAGE_OPENS), path).toContain(path);
  });

  it('gives every form the row of an endpoint', () => {
    for (const endpoint of Object.values(ACTIONS)) expect(ENDPOINTS[endpoint]).toBeDefined();
  });
});
