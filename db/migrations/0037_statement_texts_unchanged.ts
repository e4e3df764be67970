import { refuse, trigger } from '../columns'

export const { up, down } = trigger('statement_texts_unchanged', 'BEFORE UPDATE', 'statement_texts', refuse('append_only'))
