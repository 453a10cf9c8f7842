import { Module } from '@nestjs/common';
import { PanelsReadModel } from './panels.read-model.js';

/** The part of panels that knows no other subject, so that subjects which panels themselves build on can import it. */
@Module({ providers: [PanelsReadModel], exports: [PanelsReadModel] })
export class PanelsReadModule {}
