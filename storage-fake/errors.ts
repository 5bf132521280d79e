/** Error codes of the S3 REST API that this server answers, with their HTTP status. */
const statusOf = {
  AccessDenied: 403,
  AuthorizationHeaderMalformed: 400,
  AuthorizationQueryParametersError: 400,
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
  InvalidBucketState: 409,
  InvalidDigest: 400,
  InvalidPart: 400,
  InvalidPartOrder: 400,
  InvalidRange: 416,
  InvalidRequest: 400,
  InvalidURI: 400,
  KeyTooLongError: 400,
  MalformedXML: 400,
  MetadataTooLarge: 400,
  MethodNotAllowed: 405,
  MissingContentLength: 411,
  NoSuchBucket: 404,
  NoSuchKey: 404,
  NoSuchObjectLockConfiguration: 404,
  NoSuchUpload: 404,
  NoSuchVersion: 404,
  NotImplemented: 501,
  ObjectLockConfigurationNotFoundError: 404,
  OperationAborted: 409,
  RequestTimeTooSkewed: 403,
  SignatureDoesNotMatch: 403,
  UnexpectedContent: 400,
  XAmzContentSHA256Mismatch: 400,
} as const

export type S3ErrorCode = keyof typeof statusOf

/** A refusal that the client sees as an S3 error document. */
export class S3Error extends Error {
  readonly code: S3ErrorCode
  readonly status: number
  readonly headers: Record<string, string>

  constructor(code: S3ErrorCode, message: string, headers: Record<string, string> = {}) {
    super(message)
    this.name = 'S3Error'
    this.code = code
    this.status = statusOf[code]
    this.headers = headers
  }
}
