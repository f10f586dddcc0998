import { byId, endpoint } from './endpoint';
import { createDevice, createMute, deviceSchema, messagesSchema, muteList, muteSchema, takePage, updateEscalation, updateMessages, updateRule } from './messages';
import { byToken } from './shares';

/** Who is told of what, when, and by which means. */
export const endpointsMessages = {
  getMessages: endpoint({ method: 'GET', path: '/messages', summary: 'Rules, the person’s own choices, their devices, turns and mutes', access: 'alerts.read', response: messagesSchema, status: 200 }),
  updateMessages: endpoint({ method: 'PATCH', path: '/messages', summary: 'The person’s own choices, quiet hours and morning digest', access: 'alerts.read', body: updateMessages, response: messagesSchema, status: 200 }),
  updateRule: endpoint({ method: 'PATCH', path: '/messages/rules', summary: 'Set a rule for the cellar or one batch', access: 'cellar.manage', body: updateRule, response: messagesSchema, status: 200 }),
  updateEscalation: endpoint({ method: 'PATCH', path: '/messages/escalation', summary: 'Who is told next where nobody answers', access: 'cellar.manage', body: updateEscalation, response: messagesSchema, status: 200 }),
  sendTestMessage: endpoint({ method: 'POST', path: '/messages/test', summary: 'Owe the asker a message by every means they have', access: 'alerts.read', response: null, status: 204 }),
  listMutes: endpoint({ method: 'GET', path: '/mutes', summary: 'Vessels that are muted now', access: 'alerts.read', response: muteList, status: 200 }),
  createMute: endpoint({ method: 'POST', path: '/batches/{id}/mutes', summary: 'Mute a vessel for a time; what can hurt someone is told all the same', access: 'alerts.mute', params: byId, body: createMute, response: muteSchema, status: 201 }),
  endMute: endpoint({ method: 'DELETE', path: '/mutes/{id}', summary: 'End a mute before its time', access: 'alerts.mute', params: byId, response: null, status: 204 }),
  createDevice: endpoint({ method: 'POST', path: '/devices', summary: 'Take push messages on this device', access: 'alerts.read', by: 'session', body: createDevice, response: deviceSchema, status: 201 }),
  removeDevice: endpoint({ method: 'DELETE', path: '/devices/{id}', summary: 'No more push messages on a device of the person', access: 'person', params: byId, response: null, status: 204 }),
  getTakeLink: endpoint({ method: 'GET', path: '/take/{token}', summary: 'What a mailed link would take in hand; looking changes nothing', access: 'anyone', params: byToken, response: takePage, status: 200 }),
  useTakeLink: endpoint({ method: 'POST', path: '/take/{token}', summary: 'Take the alert in hand by a mailed link, once', access: 'anyone', params: byToken, response: takePage, status: 200 }),
} as const;
