import type { Role } from '#shared/schemas/common'

/** What each role is for, as the rest of a sentence that begins with its name. */
export const DUTIES: Record<Role, string> = {
  owner: 'looks after people and the workspace, and may do what a developer may.',
  developer: 'brings problems in, embeds them, prepares run sheets and loads the samples.',
  steward: 'keeps the machine sheets true: graph, defects, ranges, timing.',
  reviewer: 'approves run sheets or sends them back.',
  reader: 'reads everything and changes nothing.',
}
