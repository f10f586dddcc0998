import { z } from 'zod';
import { entrySchema, revisionList, updateEntry } from './batches';
import { catalogueForm, catalogueItem, catalogueSchema } from './catalogue';
import { id } from './common';
import { byId, endpoint } from './endpoint';
import { blendForm, blendResult, drinkSchema, familySchema, finingForm, finingList, finingSchema, movedSchema, rackForm, secondDoseForm, splitForm, splitResult, topUpBatchForm } from './family';
import { calendarSchema, createJob, doneJob, jobList, jobQuery, jobSchema, linkToken, snoozeJob, takeJob, updateJob } from './jobs';
import { batchProposal, copyMust, createMust, mustList, mustQuery, mustResultSchema, mustSchema, proposalQuery, reckonedMust, reckonMustForm, scaleMustForm, solveMustForm, updateMust, versionQuery } from './musts';

/** What comes before the bottle: must sheets, the work in the cellar, the rounds. */
export const endpointsBefore = {
  getCatalogue: endpoint({ method: 'GET', path: '/catalogue', summary: 'Ingredients and yeasts: the program’s and the cellar’s own', access: 'musts.read', response: catalogueSchema, status: 200 }),
  addToCatalogue: endpoint({ method: 'POST', path: '/catalogue', summary: 'Add an ingredient or a yeast', access: 'catalogue.write', body: catalogueForm, response: catalogueItem, status: 201 }),
  updateCatalogue: endpoint({ method: 'PATCH', path: '/catalogue/{id}', summary: 'Change an own ingredient or yeast; must sheets keep what they were written with', access: 'catalogue.write', params: byId, body: catalogueForm, response: catalogueItem, status: 200 }),
  removeFromCatalogue: endpoint({ method: 'DELETE', path: '/catalogue/{id}', summary: 'Take an own ingredient or yeast out of the catalogue', access: 'catalogue.write', params: byId, response: null, status: 204 }),

  listMusts: endpoint({ method: 'GET', path: '/musts', summary: 'Must sheets, last changed first', access: 'musts.read', query: mustQuery, response: mustList, status: 200 }),
  createMust: endpoint({ method: 'POST', path: '/musts', summary: 'Write a must sheet', access: 'musts.write', body: createMust, response: mustSchema, status: 201 }),
  getMust: endpoint({ method: 'GET', path: '/musts/{id}', summary: 'A must sheet with what it promises, now or in an older version', access: 'musts.read', params: byId, query: versionQuery, response: mustSchema, status: 200 }),
  updateMust: endpoint({ method: 'PATCH', path: '/musts/{id}', summary: 'A new version; batches keep the one they were made from', access: 'musts.write', params: byId, body: updateMust, response: mustSchema, status: 200 }),
  copyMust: endpoint({ method: 'POST', path: '/musts/{id}/copy', summary: 'Copy with one change noted; notes for the next time go along', access: 'musts.write', params: byId, body: copyMust, response: mustSchema, status: 201 }),
  archiveMust: endpoint({ method: 'DELETE', path: '/musts/{id}', summary: 'Put a must sheet away; its batches keep it', access: 'musts.write', params: byId, response: null, status: 204 }),
  getBatchProposal: endpoint({ method: 'GET', path: '/musts/{id}/batch-proposal', summary: 'What a batch from this sheet would be started with, the neck too', access: 'musts.read', params: byId, query: proposalQuery, response: batchProposal, status: 200 }),
  reckonMust: endpoint({ method: 'POST', path: '/musts/reckon', summary: 'What a sheet promises, without keeping it', access: 'musts.read', body: reckonMustForm, response: mustResultSchema, status: 200 }),
  scaleMust: endpoint({ method: 'POST', path: '/musts/scale', summary: 'The same must for another vessel', access: 'musts.read', body: scaleMustForm, response: reckonedMust, status: 200 }),
  solveMust: endpoint({ method: 'POST', path: '/musts/solve', summary: 'The amount of one line for a wanted gravity or strength', access: 'musts.read', body: solveMustForm, response: reckonedMust, status: 200 }),

  updateEntry: endpoint({ method: 'PATCH', path: '/batches/{id}/entries/{entryId}', summary: 'Correct an entry; what it said is kept', access: 'entries.remove-own', params: z.object({ id, entryId: id }), body: updateEntry, response: entrySchema, status: 200 }),
  listRevisions: endpoint({ method: 'GET', path: '/batches/{id}/entries/{entryId}/revisions', summary: 'What an entry said before each correction', access: 'batches.read', params: z.object({ id, entryId: id }), response: revisionList, status: 200 }),
  getDrink: endpoint({ method: 'GET', path: '/batches/{id}/drink', summary: 'What is in the vessel by the log: gravity, strength, sulphite, nitrogen', access: 'batches.read', params: byId, response: drinkSchema, status: 200 }),
  rackBatch: endpoint({ method: 'POST', path: '/batches/{id}/rack', summary: 'Rack off the lees, with what is left and what it is topped up with', access: 'cellarwork.do', params: byId, body: rackForm, response: movedSchema, status: 201 }),
  topUpBatch: endpoint({ method: 'POST', path: '/batches/{id}/top-up', summary: 'Top up with water, must, a drink or another batch', access: 'cellarwork.do', params: byId, body: topUpBatchForm, response: movedSchema, status: 201 }),
  splitBatch: endpoint({ method: 'POST', path: '/batches/{id}/split', summary: 'Split into vessels of their own', access: 'cellarwork.do', params: byId, body: splitForm, response: splitResult, status: 201 }),
  blendBatches: endpoint({ method: 'POST', path: '/blends', summary: 'Blend batches into one', access: 'cellarwork.do', body: blendForm, response: blendResult, status: 201 }),
  getFamily: endpoint({ method: 'GET', path: '/batches/{id}/family', summary: 'Where a batch comes from and what became of it', access: 'batches.read', params: byId, response: familySchema, status: 200 }),
  listFinings: endpoint({ method: 'GET', path: '/batches/{id}/finings', summary: 'Finings of a batch, with the second dose’s time', access: 'batches.read', params: byId, response: finingList, status: 200 }),
  startFining: endpoint({ method: 'POST', path: '/batches/{id}/finings', summary: 'Fine: the first dose, and the timer of the second', access: 'cellarwork.do', params: byId, body: finingForm, response: finingSchema, status: 201 }),
  secondDose: endpoint({ method: 'POST', path: '/finings/{id}/second', summary: 'The second dose went in', access: 'jobs.do', params: byId, body: secondDoseForm, response: finingSchema, status: 200 }),

  listJobs: endpoint({ method: 'GET', path: '/jobs', summary: 'The rounds: jobs by time or in the order of the walk', access: 'jobs.read', query: jobQuery, response: jobList, status: 200 }),
  createJob: endpoint({ method: 'POST', path: '/jobs', summary: 'Put a job on the rounds', access: 'jobs.do', body: createJob, response: jobSchema, status: 201 }),
  updateJob: endpoint({ method: 'PATCH', path: '/jobs/{id}', summary: 'Change a job', access: 'jobs.do', params: byId, body: updateJob, response: jobSchema, status: 200 }),
  dropJob: endpoint({ method: 'DELETE', path: '/jobs/{id}', summary: 'Take a job off the rounds', access: 'jobs.do', params: byId, response: null, status: 204 }),
  doJob: endpoint({ method: 'POST', path: '/jobs/{id}/done', summary: 'Tick a job', access: 'jobs.do', params: byId, body: doneJob, response: jobSchema, status: 200 }),
  undoJob: endpoint({ method: 'POST', path: '/jobs/{id}/undo', summary: 'Take a tick back, within ten seconds', access: 'jobs.do', params: byId, response: jobSchema, status: 200 }),
  takeJob: endpoint({ method: 'POST', path: '/jobs/{id}/take', summary: 'Take a job in hand, or leave it to others', access: 'jobs.do', params: byId, body: takeJob, response: jobSchema, status: 200 }),
  snoozeJob: endpoint({ method: 'POST', path: '/jobs/{id}/snooze', summary: 'Put a job off', access: 'jobs.do', params: byId, body: snoozeJob, response: jobSchema, status: 200 }),
  getCalendar: endpoint({ method: 'GET', path: '/calendar', summary: 'The person’s own calendar address for the rounds', access: 'jobs.read', response: calendarSchema, status: 200 }),
  makeCalendar: endpoint({ method: 'POST', path: '/calendar', summary: 'Make the calendar address, or a new one; the old one stops', access: 'jobs.read', response: calendarSchema, status: 201 }),
  endCalendar: endpoint({ method: 'DELETE', path: '/calendar', summary: 'Take the calendar address back', access: 'jobs.read', response: null, status: 204 }),
  readCalendar: endpoint({ method: 'GET', path: '/calendars/{token}/rounds.ics', summary: 'The rounds as iCalendar (RFC 5545); the address is the key', access: 'anyone', params: z.object({ token: linkToken }), response: null, status: 200 }),
} as const;
