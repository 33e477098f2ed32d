import type { Requirement } from '@/domain/rulebook/requirement';
import { AnswerFields } from './AnswerFields';
import { PhotographFields, PlugGaugeFields, SealFields, SheetFields } from './EvidenceFields';
import { LimitFields, ReferenceFields } from './LimitFields';

interface RequirementFormProps {
  readonly value: Requirement;
  readonly onChange: (value: Requirement) => void;
}

/** The fields of one kind of requirement, and no others. */
export const RequirementForm = ({ value, onChange }: RequirementFormProps) => {
  switch (value.kind) {
    case 'limit':
      return <LimitFields value={value} onChange={onChange} />;
    case 'reference-average':
      return <ReferenceFields value={value} onChange={onChange} />;
    case 'choice':
    case 'yes-no':
    case 'matches-paperwork':
      return <AnswerFields value={value} onChange={onChange} />;
    case 'plug-gauge':
      return <PlugGaugeFields value={value} onChange={onChange} />;
    case 'photograph':
      return <PhotographFields value={value} onChange={onChange} />;
    case 'sheet':
      return <SheetFields value={value} onChange={onChange} />;
    case 'seal':
      return <SealFields value={value} onChange={onChange} />;
  }
};
