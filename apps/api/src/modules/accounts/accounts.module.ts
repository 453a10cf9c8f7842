import { Module } from '@nestjs/common';
import { JwtModule } from '@nestjs/jwt';
import { Config } from '../../config/config.js';
import { AccountsController } from './accounts.controller.js';
import { AccountsQueries } from './accounts.queries.js';
import { AccountsService } from './accounts.service.js';
import { MeReadModel } from './me.read-model.js';
import { PasswordResetsService } from './password-resets.service.js';
import { PasswordHasher } from './passwords.js';
import { SessionsController } from './sessions.controller.js';
import { SessionsQueries } from './sessions.queries.js';
import { SessionsService } from './sessions.service.js';

@Module({
  imports: [
    JwtModule.registerAsync({
      inject: [Config],
      useFactory: (config: Config) => ({ secret: config.sessionSecret, signOptions: { algorithm: 'HS256' } }),
    }),
  ],
  controllers: [AccountsController, SessionsController],
  providers: [
    AccountsQueries,
    AccountsService,
    MeReadModel,
    PasswordHasher,
    PasswordResetsService,
    SessionsQueries,
    SessionsService,
  ],
  exports: [PasswordHasher],
})
export class AccountsModule {}
