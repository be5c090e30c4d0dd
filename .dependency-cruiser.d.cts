import type { IConfiguration, IForbiddenRuleType } from 'dependency-cruiser';

declare const configuration: IConfiguration & { forbidden: IForbiddenRuleType[] };
export = configuration;
