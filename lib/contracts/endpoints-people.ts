import { byId, endpoint } from './endpoint';
import {
  accountSchema, askForLink, byLink, changeMail, changePassphrase, confirmSecondFactor, createCellar, createdToken, createInvitation, createToken, deleteAccount, deleteCellar, invitationList, invitationSchema, invitationView,
  joinByInvitation, joinedSchema, madeCellar, mailConfirmed, memberSchema, recoveryCodes, resetPassphrase, secondFactorSecret, tokenList, trailExportQuery, trailList, trailQuery, updateCellar, updateMe, updateMember, withCode, withPassphrase,
} from './people';

/** Who shares a cellar, a person's own account, tokens, and the trail. */
export const endpointsPeople = {
  updateMe: endpoint({ method: 'PATCH', path: '/me', summary: 'Change one’s name, time zone, units', access: 'person', body: updateMe, response: null, status: 204 }),

  updateMember: endpoint({ method: 'PATCH', path: '/members/{id}', summary: 'Change a member’s role; the last keeper stays one', access: 'members.manage', params: byId, body: updateMember, response: memberSchema, status: 200 }),
  removeMember: endpoint({ method: 'DELETE', path: '/members/{id}', summary: 'Take a member out; their sessions, streams and tokens end here at once', access: 'members.manage', params: byId, response: null, status: 204 }),
  handOver: endpoint({ method: 'POST', path: '/members/{id}/hand-over', summary: 'Make a member the keeper and stay as brewer', access: 'members.manage', by: 'session', params: byId, body: withPassphrase, response: null, status: 204 }),
  leaveCellar: endpoint({ method: 'POST', path: '/cellar/leave', summary: 'Leave the cellar; its last keeper cannot', access: 'member', by: 'session', response: null, status: 204 }),

  listInvitations: endpoint({ method: 'GET', path: '/invitations', summary: 'Who is invited', access: 'members.manage', response: invitationList, status: 200 }),
  createInvitation: endpoint({ method: 'POST', path: '/invitations', summary: 'Invite somebody by mail', access: 'members.manage', body: createInvitation, response: invitationSchema, status: 201 }),
  revokeInvitation: endpoint({ method: 'DELETE', path: '/invitations/{id}', summary: 'Take an invitation back', access: 'members.manage', params: byId, response: null, status: 204 }),
  lookAtInvitation: endpoint({ method: 'POST', path: '/invitations/look', summary: 'What an invitation offers, by the secret of its link', access: 'anyone', body: byLink, response: invitationView, status: 200 }),
  joinByInvitation: endpoint({ method: 'POST', path: '/invitations/join', summary: 'Accept with a new account', access: 'anyone', body: joinByInvitation, response: joinedSchema, status: 201 }),
  acceptInvitation: endpoint({ method: 'POST', path: '/invitations/accept', summary: 'Accept with the account that is signed in', access: 'person', body: byLink, response: madeCellar, status: 200 }),

  createCellar: endpoint({ method: 'POST', path: '/cellars', summary: 'Make a cellar of one’s own', access: 'person', body: createCellar, response: madeCellar, status: 201 }),
  updateCellar: endpoint({ method: 'PATCH', path: '/cellar', summary: 'Change the cellar’s name and time zone', access: 'cellar.manage', body: updateCellar, response: null, status: 204 }),
  deleteCellar: endpoint({ method: 'DELETE', path: '/cellar', summary: 'Delete the cellar with all that is in it', access: 'cellar.manage', by: 'session', body: deleteCellar, response: null, status: 204 }),

  listTokens: endpoint({ method: 'GET', path: '/tokens', summary: 'API tokens for this cellar: one’s own, and for a keeper everybody’s', access: 'member', by: 'session', response: tokenList, status: 200 }),
  createToken: endpoint({ method: 'POST', path: '/tokens', summary: 'Make an API token; it is shown this once', access: 'member', by: 'session', body: createToken, response: createdToken, status: 201 }),
  revokeToken: endpoint({ method: 'DELETE', path: '/tokens/{id}', summary: 'Revoke an API token', access: 'member', by: 'session', params: byId, response: null, status: 204 }),

  listTrail: endpoint({ method: 'GET', path: '/audit', summary: 'Who did what, when, from where; newest first', access: 'audit.read', query: trailQuery, response: trailList, status: 200 }),
  exportTrailCsv: endpoint({ method: 'GET', path: '/audit.csv', summary: 'The trail as CSV (RFC 4180)', access: 'audit.read', query: trailExportQuery, response: null, status: 200 }),
  exportTrailJson: endpoint({ method: 'GET', path: '/audit.json', summary: 'The trail as JSON', access: 'audit.read', query: trailExportQuery, response: null, status: 200 }),

  getAccount: endpoint({ method: 'GET', path: '/account', summary: 'How one’s account is secured', access: 'person', response: accountSchema, status: 200 }),
  listAccountTrail: endpoint({ method: 'GET', path: '/account/trail', summary: 'What happened to one’s account', access: 'person', query: trailQuery, response: trailList, status: 200 }),
  changePassphrase: endpoint({ method: 'POST', path: '/account/passphrase', summary: 'Choose another passphrase; every other sign-in ends', access: 'person', body: changePassphrase, response: null, status: 204 }),
  changeMail: endpoint({ method: 'POST', path: '/account/mail-address', summary: 'Ask for another mail address; both have to confirm', access: 'person', body: changeMail, response: null, status: 202 }),
  dropMailChange: endpoint({ method: 'DELETE', path: '/account/mail-address', summary: 'Take the asked-for change of address back', access: 'person', response: null, status: 204 }),
  beginSecondFactor: endpoint({ method: 'POST', path: '/account/second-factor', summary: 'A secret for an authenticator (RFC 6238)', access: 'person', body: withPassphrase, response: secondFactorSecret, status: 201 }),
  confirmSecondFactor: endpoint({ method: 'POST', path: '/account/second-factor/confirm', summary: 'Turn the second factor on with a first code; the recovery codes are shown this once', access: 'person', body: confirmSecondFactor, response: recoveryCodes, status: 200 }),
  endSecondFactor: endpoint({ method: 'POST', path: '/account/second-factor/off', summary: 'Take the second factor off', access: 'person', body: withCode, response: null, status: 204 }),
  renewRecoveryCodes: endpoint({ method: 'POST', path: '/account/recovery-codes', summary: 'New recovery codes; the old ones stop', access: 'person', body: withCode, response: recoveryCodes, status: 201 }),
  exportAccount: endpoint({ method: 'GET', path: '/account/export', summary: 'All that is kept about oneself, as JSON', access: 'person', response: null, status: 200 }),
  deleteAccount: endpoint({ method: 'DELETE', path: '/account', summary: 'Delete one’s account', access: 'person', body: deleteAccount, response: null, status: 204 }),

  askForSignInLink: endpoint({ method: 'POST', path: '/sign-in-links', summary: 'Mail a link to sign in with', access: 'anyone', body: askForLink, response: null, status: 202 }),
  askForPassphraseLink: endpoint({ method: 'POST', path: '/passphrase-links', summary: 'Mail a link to choose a new passphrase with', access: 'anyone', body: askForLink, response: null, status: 202 }),
  resetPassphrase: endpoint({ method: 'POST', path: '/passphrase-resets', summary: 'Choose a new passphrase by the secret of a mailed link', access: 'anyone', body: resetPassphrase, response: null, status: 204 }),
  confirmMail: endpoint({ method: 'POST', path: '/mail-confirmations', summary: 'Confirm a change of mail address by the secret of a mailed link', access: 'anyone', body: byLink, response: mailConfirmed, status: 200 }),
} as const;
