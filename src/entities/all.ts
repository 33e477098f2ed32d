import { ColumnChoice } from './event/column-choice';
import { Entry } from './event/entry';
import { Event } from './event/event';
import { GaugeRow } from './event/gauge';
import { Inspection } from './event/inspection';
import { Interest } from './event/interest';
import { NoticeCounter } from './event/notice-counter';
import { VerdictDraft } from './event/verdict-draft';
import { BuilderGrant } from './paperwork/builder-grant';
import { Car } from './paperwork/car';
import { Engine } from './paperwork/engine';
import { EngineOffer } from './paperwork/engine-offer';
import { KeptFile } from './paperwork/file';
import { Paperwork } from './paperwork/paperwork';
import { SheetColumns } from './paperwork/sheet-columns';
import { GuardianRequest } from './people/guardian-request';
import { Guardianship } from './people/guardianship';
import { Identity } from './people/identity';
import { Invitation } from './people/invitation';
import { Mail } from './people/mail';
import { Membership } from './people/membership';
import { Person } from './people/person';
import { Session } from './people/session';
import { SignInLink } from './people/sign-in-link';
import { RaceClass } from './series/race-class';
import { RulebookDraft } from './series/rulebook-draft';
import { RulesQuestion } from './series/rules-question';
import { Season } from './series/season';
import { Series } from './series/series';

/** Every mapped table, listed: nothing is discovered. */
export const entities = [
  Person,
  Identity,
  Session,
  SignInLink,
  Series,
  Membership,
  Invitation,
  Mail,
  Guardianship,
  GuardianRequest,
  Season,
  RaceClass,
  RulebookDraft,
  RulesQuestion,
  Car,
  Engine,
  EngineOffer,
  BuilderGrant,
  Paperwork,
  SheetColumns,
  KeptFile,
  Event,
  Entry,
  ColumnChoice,
  GaugeRow,
  Inspection,
  Interest,
  VerdictDraft,
  NoticeCounter,
];
