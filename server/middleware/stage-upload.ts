import type { Context } from '#server/context'
import { AppError } from '#server/errors'
import { cleanFileName, recogniseFile } from '#server/services/files/recognise-file'
import type { StagedFile } from '#server/services/files/staged-file'
import type { Upload } from '#shared/contracts/endpoint'
import type { Request, Response } from 'express'
import multer, { MulterError, type StorageEngine } from 'multer'
import { createHash, randomUUID } from 'node:crypto'
import { createWriteStream } from 'node:fs'
import { mkdir, rm } from 'node:fs/promises'
import path from 'node:path'
import { Transform } from 'node:stream'
import { pipeline } from 'node:stream/promises'

/** Streams one uploaded file to the staging folder; no transaction is open meanwhile. */
export async function stageUpload(ctx: Context, upload: Upload, req: Request, res: Response): Promise<StagedFile | null> {
  const limit = upload.maxBytes ?? ctx.config.UPLOAD_LIMIT_BYTES
  await mkdir(ctx.files.stagingFolder, { recursive: true })
  const receive = multer({
    storage: hashingStorage(ctx.files.stagingFolder),
    limits: { fileSize: limit, files: 1, fields: 50, fieldSize: 256 * 1024, parts: 60 },
    defParamCharset: 'utf8',
  }).single(upload.field)
  await new Promise<void>((resolve, reject) => receive(req, res, (error: unknown) => (error ? reject(uploadFault(error, limit)) : resolve())))
  return checked(req.file as ReceivedFile | undefined, upload)
}

interface ReceivedFile extends Express.Multer.File {
  sha256: string
}

async function checked(file: ReceivedFile | undefined, upload: Upload): Promise<StagedFile | null> {
  if (!file) {
    if (upload.required) throw new AppError('file-missing', 'No file came with the form; choose one.', { [upload.field]: 'No file was chosen.' })
    return null
  }
  try {
    const name = cleanFileName(file.originalname)
    const kind = await recogniseFile(file.path, name, file.size, upload)
    return { path: file.path, name, kind, sizeBytes: file.size, sha256: file.sha256 }
  } catch (error) {
    await rm(file.path, { force: true })
    throw error
  }
}

function hashingStorage(folder: string): StorageEngine {
  return {
    _handleFile(_req, file, done) {
      const target = path.join(folder, randomUUID())
      const hash = createHash('sha256')
      let size = 0
      const count = new Transform({
        transform(chunk: Buffer, _encoding, next) {
          hash.update(chunk)
          size += chunk.length
          next(null, chunk)
        },
      })
      pipeline(file.stream, count, createWriteStream(target, { flags: 'wx' })).then(
        () => done(null, { path: target, size, sha256: hash.digest('hex') } as Partial<ReceivedFile>),
        (error: unknown) => rm(target, { force: true }).finally(() => done(error)),
      )
    },
    _removeFile(_req, file, done) {
      rm(file.path, { force: true }).then(() => done(null), done)
    },
  }
}

function uploadFault(error: unknown, limit: number): unknown {
  if (error instanceof MulterError) {
    if (error.code === 'LIMIT_FILE_SIZE') {
      return new AppError('file-too-large', `The file is larger than ${Math.floor(limit / 1024 / 1024)} MB; nothing was stored.`)
    }
    return new AppError('invalid-input', `The form cannot be read: ${error.message}.`)
  }
  // The disk's own errors carry a number; what the form reader says about the form does not.
  if (error instanceof Error && !('errno' in error)) return new AppError('file-unreadable', `The upload broke off or is not a form (${error.message}); send it again.`)
  return error
}
