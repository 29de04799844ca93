import { z } from 'zod';
import { signInInput, signUpInput, switchTeamInput } from '@/lib/forms/auth';
import { adjustableInput, adjustablePatchShape, carInput, carPatchShape } from '@/lib/forms/car';
import { decisionInput } from '@/lib/forms/decision';
import { eventInput, eventShape } from '@/lib/forms/event';
import {
  passCorrection,
  passExclusion,
  passExport,
  passFilter,
  passImport,
  passInput,
  passPatchShape,
  passRestoration,
} from '@/lib/forms/pass';
import { readingCorrection, readingFilter, readingInput } from '@/lib/forms/reading';
import { roundFilter, roundInput, roundShape } from '@/lib/forms/round';
import { sheetFilter } from '@/lib/forms/sheet';
import {
  forecastInput,
  ownEstimateFilter,
  ownEstimateInput,
  suggestionFilter,
  suggestionInput,
} from '@/lib/forms/suggestion';
import { trackInput, trackPatchShape } from '@/lib/forms/track';
import type { Right } from '../domain/permissions';

export interface ApiOperation {
  method: 'GET' | 'POST' | 'PATCH';
  /** With {name} for a part that varies. */
  path: string;
  summary: string;
  /** `null`: a session is enough. `'public'`: nobody need be signed in. */
  right: Right | null | 'public';
  query?: z.ZodType;
  body?: z.ZodType;
  /** The body is a form with a file beside these fields. */
  multipart?: boolean;
  okStatus?: 200 | 201;
  /** What it answers, when not JSON. */
  answers?: 'text/csv';
}

const patch = (shape: Record<string, z.ZodType>) => z.object(shape).partial();

/** Every route of the API with the schema that checks it: the source of /api/openapi.json. A test holds it against the routes. */
export const API_OPERATIONS: readonly ApiOperation[] = [
  { method: 'GET', path: '/api/health', summary: 'Whether the server and its database answer', right: 'public' },
  { method: 'GET', path: '/api/openapi.json', summary: 'This description', right: 'public' },
  post('/api/auth/sign-up', 'Make a team and its owner, and sign in', 'public', signUpInput, 201),
  post('/api/auth/sign-in', 'Sign in', 'public', signInInput, 200),
  { method: 'POST', path: '/api/auth/sign-out', summary: 'End the session', right: 'public' },
  post('/api/auth/switch-team', 'Work in another of your teams', null, switchTeamInput, 200),
  { method: 'GET', path: '/api/me', summary: 'Who is signed in, in which team and role', right: null },

  { method: 'GET', path: '/api/cars', summary: 'The cars with their adjustables', right: 'car:view' },
  post('/api/cars', 'Add a car', 'car:edit', carInput, 201),
  { method: 'GET', path: '/api/cars/{id}', summary: 'One car', right: 'car:view' },
  change('/api/cars/{id}', 'Change a car', 'car:edit', patch(carPatchShape)),
  post('/api/cars/{id}/adjustables', 'Add an adjustable', 'car:edit', adjustableInput, 201),
  change('/api/cars/{id}/adjustables/{adjustableId}', 'Change an adjustable', 'car:edit', patch(adjustablePatchShape)),
  { method: 'GET', path: '/api/tracks', summary: 'The tracks', right: 'team:view' },
  post('/api/tracks', 'Add a track', 'track:edit', trackInput, 201),
  { method: 'GET', path: '/api/tracks/{id}', summary: 'One track', right: 'team:view' },
  change('/api/tracks/{id}', 'Change a track', 'track:edit', patch(trackPatchShape)),
  { method: 'GET', path: '/api/events', summary: 'The events, newest first', right: 'team:view' },
  post('/api/events', 'Add an event', 'event:edit', eventInput, 201),
  { method: 'GET', path: '/api/events/{id}', summary: 'One event', right: 'team:view' },
  change('/api/events/{id}', 'Change an event', 'event:edit', patch(eventShape)),
  { method: 'GET', path: '/api/rounds', summary: 'The rounds', right: 'team:view', query: roundFilter },
  post('/api/rounds', 'Add a round', 'round:edit', roundInput, 201),
  { method: 'GET', path: '/api/rounds/{id}', summary: 'One round', right: 'team:view' },
  change('/api/rounds/{id}', 'Change a round', 'round:edit', patch(roundShape)),

  {
    method: 'GET',
    path: '/api/readings',
    summary: 'Readings, newest first',
    right: 'reading:view',
    query: readingFilter,
  },
  post('/api/readings', 'Enter a reading (SI)', 'reading:enter', readingInput, 201),
  { method: 'GET', path: '/api/readings/{id}', summary: 'One reading', right: 'reading:view' },
  post('/api/readings/{id}/correct', 'Correct a reading by a new one', 'reading:enter', readingCorrection, 201),

  { method: 'GET', path: '/api/passes', summary: 'Passes as they stand', right: 'pass:view', query: passFilter },
  post('/api/passes', 'Log a pass', 'pass:log', passInput, 201),
  { method: 'GET', path: '/api/passes/{id}', summary: 'One pass with its history', right: 'pass:view' },
  post(
    '/api/passes/{id}/correct',
    'Correct a pass by a new row',
    'pass:correct',
    patch(passPatchShape).extend(passCorrection.shape),
    201,
  ),
  post('/api/passes/{id}/exclude', 'Leave a pass out of the model', 'pass:exclude', passExclusion, 201),
  post('/api/passes/{id}/restore', 'Let a pass count again', 'pass:exclude', passRestoration, 201),
  {
    method: 'POST',
    path: '/api/passes/import',
    summary: 'Import a pass file, or with dryRun say what it would add',
    right: 'pass:import',
    body: passImport,
    multipart: true,
  },
  {
    method: 'GET',
    path: '/api/passes/export',
    summary: 'The passes of a car as a file that import reads back',
    right: 'pass:export',
    query: passExport,
    answers: 'text/csv',
  },

  {
    method: 'GET',
    path: '/api/suggestions',
    summary: 'Suggestions of a car, newest first',
    right: 'suggestion:view',
    query: suggestionFilter,
  },
  post('/api/suggestions', 'Ask for a suggestion and keep it', 'suggestion:create', suggestionInput, 201),
  { method: 'GET', path: '/api/suggestions/{id}', summary: 'One suggestion as it was made', right: 'suggestion:view' },
  post(
    '/api/suggestions/{id}/forecast',
    'Forecast for other settings under a suggestion; stores nothing',
    'suggestion:view',
    forecastInput,
    200,
  ),
  post(
    '/api/suggestions/{id}/decision',
    'Decide, and publish the launch sheet',
    'suggestion:decide',
    decisionInput,
    201,
  ),
  {
    method: 'GET',
    path: '/api/own-estimates',
    summary: 'Own estimates for a round',
    right: 'suggestion:view',
    query: ownEstimateFilter,
  },
  post('/api/own-estimates', 'Record an own estimate or skip it', 'suggestion:decide', ownEstimateInput, 201),
  {
    method: 'GET',
    path: '/api/launch-sheets/current',
    summary: 'The current launch sheet of a car',
    right: 'sheet:view',
    query: sheetFilter,
  },
  { method: 'GET', path: '/api/launch-sheets/{id}', summary: 'One launch sheet', right: 'sheet:view' },
  { method: 'POST', path: '/api/launch-sheets/{id}/seen', summary: 'Mark a launch sheet as seen', right: 'sheet:seen' },
];

function post(
  path: string,
  summary: string,
  right: ApiOperation['right'],
  body: z.ZodType,
  okStatus: 200 | 201,
): ApiOperation {
  return { method: 'POST', path, summary, right, body, okStatus };
}

function change(path: string, summary: string, right: Right, body: z.ZodType): ApiOperation {
  return { method: 'PATCH', path, summary, right, body };
}
