import type { CookieOptions, Request, Response } from 'express';
import type { PasswordChange } from '../../shared/model/password-change';
import type { PasswordLink } from '../../shared/model/password-link';
import type { SetPassword } from '../../shared/model/set-password';
import type { SignIn } from '../../shared/model/sign-in';
import { signInLimit } from '../middleware/sign-in-limit';
import { idOf, personOf } from '../request';
import type { PasswordsService } from '../services/passwords';
import { sessionLife, type SessionsService, type Tokens } from '../services/sessions';
import { everyone } from '../roles';
import { type Route } from './route';

const cookieName = 'keepstep_refresh';

const refreshTokenOf = (req: Request): string | undefined => {
  const token = (req.cookies as Record<string, unknown> | undefined)?.[cookieName];
  return typeof token === 'string' ? token : undefined;
};

/** @param secure whether browsers reach the server by https only */
export function sessionsRoutes(sessions: SessionsService, passwords: PasswordsService, secure: boolean): Route[] {
  const cookie: CookieOptions = { httpOnly: true, sameSite: 'strict', secure, path: '/api/v1/session' };

  function answer(res: Response, { refreshToken, ...tokens }: Tokens): void {
    res.cookie(cookieName, refreshToken, { ...cookie, maxAge: sessionLife }).json(tokens);
  }

  return [
    {
      method: 'post',
      path: '/session',
      allowed: 'open',
      summary: 'Sign in; the refresh token comes in a cookie',
      body: 'sign-in',
      before: [signInLimit()],
      async handle(req, res) {
        const { email, password } = req.body as SignIn;
        answer(res, await sessions.signIn(email, password, req.get('user-agent') ?? ''));
      },
    },
    {
      method: 'post',
      path: '/session/refresh',
      allowed: 'open',
      summary: 'Trade the refresh token of the cookie for new tokens',
      async handle(req, res) {
        try {
          answer(res, await sessions.refresh(refreshTokenOf(req)));
        } catch (error) {
          res.clearCookie(cookieName, cookie);
          throw error;
        }
      },
    },
    {
      method: 'delete',
      path: '/session',
      allowed: 'open',
      summary: 'Sign out',
      status: 204,
      async handle(req, res) {
        await sessions.signOut(refreshTokenOf(req), req.user && personOf(req).sessionId);
        res.clearCookie(cookieName, cookie).status(204).end();
      },
    },
    {
      method: 'get',
      path: '/session',
      allowed: everyone,
      summary: 'Who is signed in',
      handle(req, res) {
        const { id, email, name, role } = personOf(req);
        res.json({ user: { id, email, name, role } });
      },
    },
    {
      method: 'put',
      path: '/session/password',
      allowed: everyone,
      summary: 'Change the own password; other sessions end',
      body: 'password-change',
      status: 204,
      async handle(req, res) {
        const { current, password } = req.body as PasswordChange;
        const { id, sessionId } = personOf(req);
        await passwords.change(id, sessionId, current, password);
        res.status(204).end();
      },
    },
    {
      method: 'get',
      path: '/sessions',
      allowed: everyone,
      summary: 'The own sessions',
      async handle(req, res) {
        res.json({ items: await sessions.list(personOf(req)), next: null });
      },
    },
    {
      method: 'delete',
      path: '/sessions/:id',
      allowed: everyone,
      summary: 'End one of the own sessions',
      status: 204,
      async handle(req, res) {
        await sessions.end(personOf(req), idOf(req, 'session'));
        res.status(204).end();
      },
    },
    {
      method: 'post',
      path: '/password-links/check',
      allowed: 'open',
      summary: 'Whose a one-time link is',
      body: 'password-link',
      async handle(req, res) {
        res.json(await passwords.checkLink((req.body as PasswordLink).token));
      },
    },
    {
      method: 'post',
      path: '/password',
      allowed: 'open',
      summary: 'Set a password by a one-time link',
      body: 'set-password',
      status: 204,
      async handle(req, res) {
        const { token, password } = req.body as SetPassword;
        await passwords.setByLink(token, password);
        res.status(204).end();
      },
    },
  ];
}
