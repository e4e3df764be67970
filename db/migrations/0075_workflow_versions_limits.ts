import { alter } from '../columns'

export const { up, down } = alter('workflow_versions',
  'ADD COLUMN limits JSON NOT NULL DEFAULT \'{}\' AFTER note',
  'DROP COLUMN limits')
