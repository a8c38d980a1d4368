import { listAudit } from '#shared/contracts/audit.ts';
import { addBench, editBench, listBenches } from '#shared/contracts/benches.ts';
import { editCase, getCase, listCases, openCase, reopenCase } from '#shared/contracts/cases.ts';
import type { Endpoint } from '#shared/contracts/endpoint.ts';
import {
  getExposure,
  getExposurePicture,
  getExposurePixels,
  getExposureThumbnail,
  uploadExposure,
  withdrawExposure,
} from '#shared/contracts/exposures.ts';
import {
  cancelIdentification,
  getIdentification,
  listIdentifications,
  startIdentification,
} from '#shared/contracts/identifications.ts';
import { listMail } from '#shared/contracts/mail.ts';
import { decideMatch, getMatch, listMatches, submitMatch } from '#shared/contracts/matches.ts';
import { addPerson, editPerson, listPeople } from '#shared/contracts/people.ts';
import { listReferences } from '#shared/contracts/references.ts';
import {
  changePassword,
  createFirstAdministrator,
  getSession,
  getSignInOptions,
  signIn,
  signOut,
} from '#shared/contracts/session.ts';

/** Every endpoint of the API: the start-up check and the tests go through this list. */
export const allEndpoints: readonly Endpoint[] = [
  getSession,
  signIn,
  signOut,
  getSignInOptions,
  createFirstAdministrator,
  changePassword,
  listPeople,
  addPerson,
  editPerson,
  listCases,
  openCase,
  getCase,
  editCase,
  reopenCase,
  listBenches,
  addBench,
  editBench,
  uploadExposure,
  getExposure,
  withdrawExposure,
  getExposurePicture,
  getExposurePixels,
  getExposureThumbnail,
  startIdentification,
  listIdentifications,
  getIdentification,
  cancelIdentification,
  submitMatch,
  listMatches,
  getMatch,
  decideMatch,
  listReferences,
  listMail,
  listAudit,
];
