/** The job queues; the owner creates them, the application only works them. */
export const QUEUES = [
  'send-mail',
  'make-previews',
  'render-notice',
  'sign-checkpoint',
  'remove-objects',
  'sweep-uploads',
  'remind-due',
] as const;

export type QueueName = (typeof QUEUES)[number];
