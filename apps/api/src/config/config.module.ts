import { type DynamicModule, Global, Module } from '@nestjs/common';
import { Config } from './config.js';

@Global()
@Module({})
export class ConfigModule {
  static register(config: Config): DynamicModule {
    return { module: ConfigModule, providers: [{ provide: Config, useValue: config }], exports: [Config] };
  }
}
