import { refuse, trigger } from '../columns'

export const { up, down } = trigger('entry_events_no_update', 'BEFORE UPDATE', 'entry_events', refuse('append_only'))
