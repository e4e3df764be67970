import { refuse, trigger } from '../columns'

export const { up, down } = trigger('sheets_signed_kept', 'BEFORE DELETE', 'sheets', `IF OLD.state <> 'open' THEN ${refuse('signed_sheet_unchanged')}; END IF`)
