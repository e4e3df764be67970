import { refuse, trigger } from '../columns'

export const { up, down } = trigger('sheets_signed_unchanged', 'BEFORE UPDATE', 'sheets', `IF OLD.state <> 'open' AND NOT (
    NEW.id <=> OLD.id AND NEW.uid <=> OLD.uid AND NEW.entry_id <=> OLD.entry_id AND NEW.kind <=> OLD.kind AND NEW.number <=> OLD.number
    AND NEW.definition <=> OLD.definition AND BINARY NEW.measurements <=> BINARY OLD.measurements
    AND NEW.gross <=> OLD.gross AND NEW.gross_all <=> OLD.gross_all AND NEW.net <=> OLD.net AND NEW.net16 <=> OLD.net16 AND NEW.gross16 <=> OLD.gross16
    AND NEW.measured_on <=> OLD.measured_on AND NEW.measurer_user_id <=> OLD.measurer_user_id AND BINARY NEW.measurer_name <=> BINARY OLD.measurer_name
    AND NEW.dried_since <=> OLD.dried_since AND NEW.dried_from <=> OLD.dried_from
    AND NEW.reason <=> OLD.reason AND NEW.owner_user_id <=> OLD.owner_user_id
    AND NEW.signed_at <=> OLD.signed_at AND NEW.hash <=> OLD.hash AND NEW.replaces_id <=> OLD.replaces_id
    AND BINARY NEW.slip_answers <=> BINARY OLD.slip_answers AND NEW.created_at <=> OLD.created_at
    AND (NEW.state = OLD.state OR (OLD.state = 'signed' AND NEW.state = 'replaced')))
  THEN ${refuse('signed_sheet_unchanged')}; END IF`)
