import {
  askResetRequestSchema,
  changePasswordRequestSchema,
  resetPasswordRequestSchema,
  updateAccountRequestSchema,
  userSchema,
} from '#shared/contract/session.ts'
import { createPasswordReset, patchAccount, putPassword, usePasswordReset } from '../controllers/accountController.ts'
import { tokenParams } from './params.ts'
import { defineRoute } from './route.ts'

export const accountRoutes = [
  defineRoute({
    method: 'patch',
    path: '/api/account',
    policy: 'signed-in',
    summary: 'Change one’s own name',
    body: updateAccountRequestSchema,
    answers: { 200: userSchema },
    controller: patchAccount,
  }),
  defineRoute({
    method: 'put',
    path: '/api/account/password',
    policy: 'signed-in',
    summary: 'Change one’s own password; other sessions end',
    body: changePasswordRequestSchema,
    rateLimit: 'change-password',
    answers: { 204: null },
    controller: putPassword,
  }),
  defineRoute({
    method: 'post',
    path: '/api/password-resets',
    policy: 'anybody',
    summary: 'Ask for a link to set a new password; the answer is the same whether the account exists',
    body: askResetRequestSchema,
    rateLimit: 'ask-reset',
    answers: { 202: null },
    controller: createPasswordReset,
  }),
  defineRoute({
    method: 'put',
    path: '/api/password-resets/:token',
    policy: 'anybody',
    summary: 'Set a new password through a link; all sessions end',
    params: tokenParams,
    body: resetPasswordRequestSchema,
    rateLimit: 'use-link',
    answers: { 204: null },
    controller: usePasswordReset,
  }),
]
