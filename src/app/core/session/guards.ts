import { inject } from '@angular/core';
import { type CanActivateFn, Router, type UrlTree } from '@angular/router';
import { Session } from './session';

/**
 * Guards keep people on the pages that are theirs; what an account may see is decided by the
 * server, and only there.
 */
const allow =
  (may: (session: Session) => boolean): CanActivateFn =>
  (_, state): boolean | UrlTree => {
    const session = inject(Session);
    const router = inject(Router);
    if (session.account() === null) {
      return router.createUrlTree(['/sign-in'], { queryParams: { to: state.url } });
    }
    return may(session) || router.parseUrl(session.home());
  };

export const signedIn = allow(() => true);
export const staffOnly = allow((session) => session.isStaff());
export const leadOnly = allow((session) => session.isLead());
export const attorneyOnly = allow((session) => session.role() === 'attorney');

/** Sends people to the page that they begin on. */
export const home: CanActivateFn = () => inject(Router).parseUrl(inject(Session).home());

/** The sign-in page is for those who are not signed in. */
export const signedOut: CanActivateFn = () => {
  const session = inject(Session);
  return session.account() === null || inject(Router).parseUrl(session.home());
};
