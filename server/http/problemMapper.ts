import { MulterError } from 'multer';
import { QueryFailedError } from 'typeorm';
import { PaymentServiceUnavailable } from '@/server/payments/payments.errors';
import { BadRequest, Invalid, NotFound, Problem, Refused, Unavailable } from './problem';

/** What is known of a driver's error without reading its message, which may repeat a person's data. */
export interface DatabaseFault {
  sqlState: string;
  constraint: string | undefined;
  table: string | undefined;
  column: string | undefined;
}

/** The PostgreSQL part of an error, bare or wrapped by TypeORM; undefined for anything else. */
export function databaseFault(error: unknown): DatabaseFault | undefined {
  const cause: unknown = error instanceof QueryFailedError ? error.driverError : error;
  if (!(cause instanceof Error) || !('code' in cause) || typeof cause.code !== 'string') return undefined;
  if (!/^[0-9A-Z]{5}$/.test(cause.code)) return undefined;
  const text = (key: 'constraint' | 'table' | 'column'): string | undefined => {
    const value: unknown = Reflect.get(cause, key);
    return typeof value === 'string' ? value : undefined;
  };
  return { sqlState: cause.code, constraint: text('constraint'), table: text('table'), column: text('column') };
}

/**
 * The problem an error stands for; undefined when it is a fault of ours, which is answered 500 and logged.
 * One mapper serves every route, so that the same clash never gets two different answers.
 */
export function toProblem(error: unknown): Problem | undefined {
  if (error instanceof Problem) return error;
  const fault = databaseFault(error);
  if (fault) return fromDatabase(fault);
  if (error instanceof PaymentServiceUnavailable) {
    return new Unavailable('payments_away', 'The payment service does not answer just now. Nothing is paid twice: try again in a moment.');
  }
  if (error instanceof MulterError) return fromUpload(error);
  if (error instanceof URIError) return new BadRequest('bad_address', 'The address is not readable. Check it and try again.');
  return fromBodyParser(error);
}

/** SQLSTATEs that a client's request can cause: PostgreSQL 15 manual, appendix A. */
function fromDatabase({ sqlState, constraint }: DatabaseFault): Problem | undefined {
  const where = constraint ?? 'request';
  switch (sqlState) {
    case '23505': // unique_violation
    case '23P01': // exclusion_violation
      return new Refused('already_exists', 'That is already there, or was added a moment ago. Reload and look again.');
    case '23503': // foreign_key_violation
      return new Refused('linked', 'Something this refers to is not there, or is still in use. Reload and try again.');
    case '23514': // check_violation
    case '23502': // not_null_violation
    case '22001': // string_data_right_truncation
    case '22003': // numeric_value_out_of_range
    case '22007': // invalid_datetime_format
    case '22008': // datetime_field_overflow
    case '22021': // character_not_in_repertoire
    case '22P02': // invalid_text_representation
    case '22P05': // untranslatable_character
      return new Invalid([{ field: where, message: 'This value is outside what can be stored.' }]);
    case '40001': // serialization_failure, after the unit of work's own retries
    case '40P01': // deadlock_detected
    case '55P03': // lock_not_available
      return new Unavailable('busy', 'Somebody else is changing the same thing. Try again in a moment.', 1);
    case '57P01': // admin_shutdown
    case '57P03': // cannot_connect_now
    case '53300': // too_many_connections
      return new Unavailable('database_away', 'The service is restarting. Try again in a moment.');
    default:
      return undefined;
  }
}

function fromUpload(error: MulterError): Problem {
  if (error.code === 'LIMIT_FILE_SIZE') {
    return new Problem({ status: 413, title: 'Too large', code: 'file_too_large', detail: 'That file is too large. Send a smaller one.' });
  }
  const field = error.field ?? 'file';
  return new Invalid([{ field, message: `This upload is not taken here (${error.code.toLowerCase().replaceAll('_', ' ')}).` }]);
}

/** Express's own parsers throw http-errors: an Error with `status` and often `type`. Only 4xx are the client's. */
function fromBodyParser(error: unknown): Problem | undefined {
  if (!(error instanceof Error) || !('status' in error) || typeof error.status !== 'number') return undefined;
  const { status } = error;
  if (status < 400 || status > 499) return undefined;
  if (status === 404) return new NotFound();
  if (status === 413) {
    return new Problem({ status, title: 'Too large', code: 'body_too_large', detail: 'That is more than is taken at once. Send less.' });
  }
  if (status === 415) return unsupportedType('application/json');
  return new BadRequest('unreadable_body', 'The body is not valid JSON. Send a JSON object.');
}

/** 415, naming what would be taken. */
export function unsupportedType(wanted: string): Problem {
  return new Problem({ status: 415, title: 'Wrong content type', code: 'wrong_content_type', detail: `Send the body as ${wanted}.` });
}
