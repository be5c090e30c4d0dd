export declare function kernelModuleText(): Promise<string>;
