import {
  applyDecorators,
  type CallHandler,
  type ExecutionContext,
  HttpCode,
  Injectable,
  type NestInterceptor,
  SetMetadata,
  StreamableFile,
} from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import { ApiResponse } from '@nestjs/swagger';
import type { Response } from 'express';
import { map, type Observable } from 'rxjs';
import type { z } from 'zod';
import { etagOf } from './etag.js';

const ANSWER_SCHEMA = 'faintward:answer';

/**
 * Says what a route answers: for the documentation, and as the sieve through which the answer passes, so that a field the
 * contract does not name cannot leave the server.
 */
export const Answers = (schema: z.ZodType, options: { status?: number; description?: string } = {}) =>
  applyDecorators(
    SetMetadata(ANSWER_SCHEMA, schema),
    ...(options.status === undefined ? [] : [HttpCode(options.status)]),
    ApiResponse({
      status: options.status ?? 'default',
      description: options.description ?? '',
      standardSchema: schema,
    }),
  );

/** For routes without content in their answer. */
export const AnswersNothing = () => applyDecorators(HttpCode(204), ApiResponse({ status: 204, description: 'Done.' }));

/** Applies `@Answers`, and sends the `version` of an answer as its ETag. */
@Injectable()
export class AnswerInterceptor implements NestInterceptor {
  constructor(private readonly reflector: Reflector) {}

  intercept(context: ExecutionContext, next: CallHandler): Observable<unknown> {
    const schema = this.reflector.get<z.ZodType | undefined>(ANSWER_SCHEMA, context.getHandler());
    return next.handle().pipe(
      map((answer: unknown) => {
        if (schema === undefined || answer instanceof StreamableFile) return answer;
        const parsed = schema.safeParse(answer);
        if (!parsed.success) {
          const [issue] = parsed.error.issues;
          const where = `${context.getClass().name}.${context.getHandler().name}`;
          throw new Error(
            `${where} answered against its contract at ${issue?.path.join('.') ?? '?'}: ${issue?.message ?? ''}`,
          );
        }
        const version = (parsed.data as { version?: unknown } | null)?.version;
        if (typeof version === 'number' && Number.isInteger(version)) {
          context.switchToHttp().getResponse<Response>().setHeader('ETag', etagOf(version));
        }
        return parsed.data;
      }),
    );
  }
}
