// @ts-check

/** Codes and statuses as the "Error Responses" chapter of Amazon's S3 API reference lists them. */
const STATUS = /** @type {const} */ ({
  AccessDenied: 403,
  AuthorizationHeaderMalformed: 400,
  BadDigest: 400,
  BucketAlreadyOwnedByYou: 409,
  BucketNotEmpty: 409,
  EntityTooLarge: 400,
  EntityTooSmall: 400,
  IncompleteBody: 400,
  InternalError: 500,
  InvalidAccessKeyId: 403,
  InvalidArgument: 400,
  InvalidBucketName: 400,
  InvalidDigest: 400,
  InvalidPart: 400,
  InvalidPartOrder: 400,
  InvalidRange: 416,
  KeyTooLongError: 400,
  MalformedXML: 400,
  MethodNotAllowed: 405,
  MissingContentLength: 411,
  NoSuchBucket: 404,
  NoSuchKey: 404,
  NoSuchUpload: 404,
  NotImplemented: 501,
  PreconditionFailed: 412,
  RequestTimeTooSkewed: 403,
  SignatureDoesNotMatch: 403,
  XAmzContentSHA256Mismatch: 400,
});

/** @typedef {keyof typeof STATUS} S3Code */

export class S3Error extends Error {
  /** @param {S3Code} code @param {string} message */
  constructor(code, message) {
    super(message);
    this.code = code;
    this.status = STATUS[code];
  }
}
