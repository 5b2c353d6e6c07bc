import type { Routes } from '@angular/router';
import {
  attorneyOnly,
  home,
  leadOnly,
  signedIn,
  signedOut,
  staffOnly,
} from './core/session/guards';
import { unsavedWork } from './core/unsaved-work';

/** Every section is fetched when it is first opened. */
const caseSections: Routes = [
  { path: '', pathMatch: 'full', redirectTo: 'brief' },
  {
    path: 'brief',
    title: 'Brief',
    canDeactivate: [unsavedWork],
    loadComponent: async () => (await import('./case-file/brief/brief')).Brief,
  },
  {
    path: 'exhibits',
    title: 'Exhibits',
    canDeactivate: [unsavedWork],
    loadComponent: async () => (await import('./case-file/exhibits/exhibits')).Exhibits,
  },
  {
    path: 'custody',
    title: 'Custody',
    loadComponent: async () => (await import('./case-file/custody/custody')).Custody,
  },
  {
    path: 'survey',
    title: 'Survey',
    canDeactivate: [unsavedWork],
    loadComponent: async () => (await import('./case-file/survey/survey')).Survey,
  },
  {
    path: 'motion',
    title: 'Motion',
    canDeactivate: [unsavedWork],
    loadComponent: async () => (await import('./case-file/motion/motion')).Motion,
  },
  {
    path: 'findings',
    title: 'Findings',
    canDeactivate: [unsavedWork],
    loadComponent: async () => (await import('./case-file/findings/findings')).Findings,
  },
  {
    path: 'disclosure',
    title: 'Disclosure',
    loadComponent: async () => (await import('./case-file/disclosure/disclosure')).Disclosure,
  },
  {
    path: 'log',
    title: 'Log',
    canDeactivate: [unsavedWork],
    loadComponent: async () => (await import('./case-file/log/log')).Log,
  },
];

export const routes: Routes = [
  { path: '', pathMatch: 'full', canActivate: [home], children: [] },
  {
    path: 'sign-in',
    title: 'Sign in',
    canActivate: [signedOut],
    loadComponent: async () => (await import('./sign-in/sign-in')).SignIn,
  },
  {
    path: 'cases',
    canActivate: [staffOnly],
    children: [
      {
        path: '',
        pathMatch: 'full',
        title: 'Cases',
        loadComponent: async () => (await import('./cases/case-list')).CaseList,
      },
      {
        path: ':caseId',
        loadComponent: async () => (await import('./case-file/case-frame')).CaseFrame,
        children: caseSections,
      },
    ],
  },
  {
    path: 'laboratory',
    title: 'Laboratory',
    canActivate: [leadOnly],
    loadComponent: async () => (await import('./laboratory/laboratory')).Laboratory,
  },
  {
    path: 'disclosures',
    canActivate: [attorneyOnly],
    children: [
      {
        path: '',
        pathMatch: 'full',
        title: 'Disclosures',
        loadComponent: async () =>
          (await import('./disclosure-room/disclosure-list')).DisclosureList,
      },
      {
        path: ':releaseId',
        title: 'Summary',
        loadComponent: async () =>
          (await import('./disclosure-room/disclosure-summary')).DisclosureSummary,
      },
    ],
  },
  {
    path: '**',
    title: 'Not found',
    canActivate: [signedIn],
    loadComponent: async () => (await import('./shell/not-found')).NotFound,
  },
];
