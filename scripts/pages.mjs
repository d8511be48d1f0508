// @ts-check

/**
 * Every page of the product and who looks at it, for pictures. `{capture}` and the like are filled in from the demo
 * workshop; a page whose thing the demo does not have is named and left out.
 *
 * @typedef {'nobody' | 'owner' | 'instructor' | 'technician' | 'learner'} Looker
 */

/** @type {Record<Exclude<Looker, 'nobody'>, string>} */
export const demoPeople = {
  owner: 'owner@demo.example',
  instructor: 'instructor@demo.example',
  technician: 'technician@demo.example',
  learner: 'learner@demo.example',
};

/** Known to everybody: the README names it, and a production setting refuses to make these people. */
export const demoPassword = 'crank-and-cam-demo';

/** @type {Looker[]} */
const staff = ['owner', 'instructor', 'technician'];
/** @type {Looker[]} */
const people = [...staff, 'learner'];

/** @type {{ name: string, path: string, lookers: Looker[] }[]} */
export const pages = [
  { name: 'start', path: '/', lookers: ['nobody', ...people] },
  { name: 'sign-in', path: '/sign-in', lookers: ['nobody'] },
  { name: 'code', path: '/sign-in/code', lookers: ['nobody'] },
  { name: 'reset', path: '/reset', lookers: ['nobody'] },
  { name: 'reset-new', path: '/reset/new', lookers: ['nobody'] },
  { name: 'invitation', path: '/invitation', lookers: ['nobody'] },
  { name: 'e-mail', path: '/e-mail', lookers: ['nobody'] },
  { name: 'sign-up', path: '/sign-up', lookers: ['nobody'] },
  { name: 'shared', path: '/s/{share}', lookers: ['nobody'] },
  { name: 'not-found', path: '/there-is-no-such-page', lookers: ['nobody', 'technician'] },
  { name: 'captures', path: '/captures', lookers: people },
  { name: 'capture', path: '/captures/{capture}', lookers: people },
  { name: 'reading', path: '/captures/{capture}/reading', lookers: ['technician'] },
  { name: 'wheel', path: '/captures/{capture}/wheel', lookers: ['technician'] },
  { name: 'turns', path: '/captures/{capture}/turns', lookers: ['technician'] },
  { name: 'spectrum', path: '/captures/{capture}/spectrum', lookers: ['technician'] },
  { name: 'compare', path: '/captures/{capture}/compare', lookers: staff },
  { name: 'comparison', path: '/comparisons/{comparison}', lookers: staff },
  { name: 'jobs', path: '/jobs', lookers: people },
  { name: 'library', path: '/library', lookers: people },
  { name: 'known-good', path: '/library/{knownGood}', lookers: staff },
  { name: 'teaching', path: '/teaching', lookers: people },
  { name: 'import', path: '/teaching/import', lookers: ['instructor'] },
  { name: 'set', path: '/teaching/sets/{set}', lookers: people },
  { name: 'set-new', path: '/teaching/sets/new', lookers: ['instructor'] },
  { name: 'set-edit', path: '/teaching/sets/{set}/edit', lookers: ['instructor'] },
  { name: 'exercise', path: '/teaching/exercises/{exercise}', lookers: people },
  { name: 'exercise-new', path: '/teaching/exercises/new', lookers: ['instructor'] },
  { name: 'exercise-edit', path: '/teaching/exercises/{exercise}/edit', lookers: ['instructor'] },
  { name: 'exercise-answers', path: '/teaching/exercises/{exercise}/answers', lookers: ['instructor'] },
  { name: 'workshop', path: '/workshop', lookers: people },
  { name: 'own-sign-in', path: '/workshop/sign-in', lookers: people },
  { name: 'owner', path: '/workshop/owner', lookers: ['owner'] },
];

export const themes = /** @type {const} */ (['paper', 'dim']);

/** Phone, small tablet, desk, large screen. */
export const widths = /** @type {const} */ ([360, 834, 1440, 2560]);
