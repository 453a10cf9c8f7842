import { type DynamicModule, Global, Inject, Module, type OnApplicationShutdown } from '@nestjs/common';
import type { DatabaseHandle } from './connection.js';
import { DATABASE_HANDLE, DatabaseService } from './transaction.js';

@Global()
@Module({})
export class DatabaseModule implements OnApplicationShutdown {
  constructor(@Inject(DATABASE_HANDLE) private readonly handle: DatabaseHandle) {}

  static register(handle: DatabaseHandle): DynamicModule {
    return {
      module: DatabaseModule,
      providers: [{ provide: DATABASE_HANDLE, useValue: handle }, DatabaseService],
      exports: [DATABASE_HANDLE, DatabaseService],
    };
  }

  async onApplicationShutdown(): Promise<void> {
    await this.handle.close();
  }
}
