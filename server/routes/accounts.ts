import { z } from 'zod'
import { deleteAccountRequestSchema, leavingSchema } from '#shared/contract/account.ts'
import {
  askResetRequestSchema,
  changePasswordRequestSchema,
  resetPasswordRequestSchema,
  updateAccountRequestSchema,
  userSchema,
} from '#shared/contract/session.ts'
import { createPasswordReset, patchAccount, putPassword, usePasswordReset } from '../controllers/accountController.ts'
import { deleteOwnAccount, downloadAccount, readLeaving } from '../controllers/leavingController.ts'
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
    method: 'get',
    path: '/api/account/export',
    policy: 'signed-in',
    summary: 'Everything of one’s own as one file',
    rateLimit: 'export-account',
    answers: { 200: z.unknown() },
    controller: downloadAccount,
  }),
  defineRoute({
    method: 'get',
    path: '/api/account/leaving',
    policy: 'signed-in',
    summary: 'What deleting one’s account would do to builds',
    answers: { 200: leavingSchema },
    controller: readLeaving,
  }),
  defineRoute({
    method: 'delete',
    path: '/api/account',
    policy: 'signed-in',
    summary: 'Delete one’s own account; builds that others work in stay, under “former member”',
    body: deleteAccountRequestSchema,
    rateLimit: 'change-password',
    answers: { 204: null },
    controller: deleteOwnAccount,
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
