import { constants } from 'node:fs';
import { lstat, open, realpath } from 'node:fs/promises';
import { sep } from 'node:path';
import { diskOf } from '../../src-core/disk';

export const nodeDisk = diskOf({ separator: sep, realpath, lstat, open, constants });
