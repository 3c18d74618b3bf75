/**
 * Shown wherever a safety-relevant guarantee or one of its alarms appears: board, page, alarm, notification,
 * report, API. One wording for all of them.
 */
export const caution = {
  title: 'Safety-relevant: advisory only',
  sentences: [
    'This is advisory monitoring from inspection data. It is no protective system, interlock or safety function and replaces none.',
    'Act by the site’s procedures, the local codes and the judgement of the qualified or licensed people responsible.',
    'Absence of an alarm proves nothing about a single unit.',
  ],
} as const;
