import express, { type Request, type RequestHandler } from 'express';
import multer, { MulterError } from 'multer';
import { BadRequest } from './problem';
import { unsupportedType } from './problemMapper';
import type { AnyRoute, UploadedFile, UploadRule } from './route';

const jsonLimitBytes = 256 * 1024;
const rawLimitBytes = 1024 * 1024;
const formFields = { fields: 40, fieldSize: 20_000, fieldNameSize: 100, parts: 60, headerPairs: 40 };

/**
 * The parser a route's body needs. It runs after the permission check, so that nobody unknown makes us parse anything,
 * and it is strict about the content type: a page of another origin could send a form or plain text without being asked.
 */
export function bodyParser(declared: AnyRoute): RequestHandler[] {
  if (declared.rawBody) return [express.raw({ type: () => true, limit: rawLimitBytes })];
  if (declared.files) return [requireType('multipart/form-data'), upload(declared.files)];
  if (declared.request) return [requireType('application/json'), express.json({ limit: jsonLimitBytes, strict: false })];
  return [];
}

function requireType(type: string): RequestHandler {
  return (request, _response, next) => {
    if (!hasBody(request) || request.is(type)) next();
    else next(unsupportedType(type));
  };
}

function hasBody(request: Request): boolean {
  return request.get('transfer-encoding') !== undefined || Number(request.get('content-length') ?? 0) > 0;
}

function upload(rule: UploadRule): RequestHandler {
  const limits = { ...formFields, fileSize: rule.maxBytes, files: rule.maxCount };
  const parse = multer({ storage: multer.memoryStorage(), limits }).array(rule.field, rule.maxCount);
  return (request, response, next) => {
    void parse(request, response, (error: unknown) => {
      // A form without a boundary or cut off in the middle fails in the parser below multer with an error of no kind.
      if (error === undefined || error === null || error instanceof MulterError) next(error);
      else next(new BadRequest('unreadable_form', 'The form could not be read to its end. Send it again.'));
    });
  };
}

/** The uploaded files of a request, in the order sent. */
export function uploadedFiles(request: Request): UploadedFile[] {
  const { files } = request;
  if (!Array.isArray(files)) return [];
  return files.map(({ originalname, buffer, mimetype }) => ({ name: originalname.slice(0, 200), bytes: buffer, claimedType: mimetype }));
}
