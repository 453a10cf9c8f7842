import { type DynamicModule, Module } from '@nestjs/common';
import { Config } from './config/config.js';
import { ConfigModule } from './config/config.module.js';
import type { DatabaseHandle } from './database/connection.js';
import { DatabaseModule } from './database/connection.module.js';
import { AccountsModule } from './modules/accounts/accounts.module.js';
import { AdministrationModule } from './modules/administration/administration.module.js';
import { AwardsModule } from './modules/awards/awards.module.js';
import { EstimatesModule } from './modules/estimates/estimates.module.js';
import { FacilitiesModule } from './modules/facilities/facilities.module.js';
import { HealthModule } from './modules/health/health.module.js';
import { LightModule } from './modules/light/light.module.js';
import { ObservationsModule } from './modules/observations/observations.module.js';
import { PanelsModule } from './modules/panels/panels.module.js';
import { PeopleModule } from './modules/people/people.module.js';
import { ProposalsModule } from './modules/proposals/proposals.module.js';
import { RankingModule } from './modules/ranking/ranking.module.js';
import { ReferenceDataModule } from './modules/reference-data/reference-data.module.js';
import { ReviewsModule } from './modules/reviews/reviews.module.js';
import { SemestersModule } from './modules/semesters/semesters.module.js';
import { SpectraModule } from './modules/spectra/spectra.module.js';
import { SubmissionsModule } from './modules/submissions/submissions.module.js';
import { TargetsModule } from './modules/targets/targets.module.js';
import { TeamModule } from './modules/team/team.module.js';
import { PlatformModule } from './platform/platform.module.js';

/** One line per subject, in alphabetical order. */
const SUBJECTS = [
  AccountsModule,
  AdministrationModule,
  AwardsModule,
  EstimatesModule,
  FacilitiesModule,
  HealthModule,
  LightModule,
  ObservationsModule,
  PanelsModule,
  PeopleModule,
  ProposalsModule,
  RankingModule,
  ReferenceDataModule,
  ReviewsModule,
  SemestersModule,
  SpectraModule,
  SubmissionsModule,
  TargetsModule,
  TeamModule,
];

@Module({})
export class AppModule {
  static register(config: Config, database: DatabaseHandle): DynamicModule {
    return {
      module: AppModule,
      imports: [ConfigModule.register(config), DatabaseModule.register(database), PlatformModule, ...SUBJECTS],
    };
  }
}
