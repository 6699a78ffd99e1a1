/** A fault of the file system in words, with what to do about it. */
export interface SystemFault {
  readonly found: string;
  readonly remedy: string;
}

const faults: { readonly [code: string]: SystemFault } = {
  ENOENT: { found: "a folder that does not exist", remedy: "make the folder first" },
  ENOTDIR: { found: "a file where a folder was named", remedy: "correct the path" },
  EISDIR: { found: "a folder", remedy: "name a file" },
  ENOTEMPTY: { found: "a folder that is not empty", remedy: "choose another place" },
  EACCES: { found: "no permission", remedy: "choose another place, or change the permissions" },
  EPERM: { found: "no permission", remedy: "choose another place, or change the permissions" },
  EROFS: { found: "a place that can only be read", remedy: "choose another place" },
  ENOSPC: { found: "no room left on the device", remedy: "make room, or choose another place" },
  EFBIG: { found: "a limit on the size of files", remedy: "raise the limit, or choose another place" },
  EDQUOT: { found: "no room left in the quota", remedy: "make room, or choose another place" },
  ENAMETOOLONG: { found: "a name that is too long", remedy: "choose a shorter name" },
  ELOOP: { found: "links that lead in a circle", remedy: "correct the path" },
  EIO: { found: "a fault of the device", remedy: "choose another place" },
  EINVAL: { found: "a place that takes no files", remedy: "choose another place" },
};

/** Codes of the system mean nothing to most users; one that is not known here is shown as it is. */
export function systemFault(code: string): SystemFault {
  const known = Object.hasOwn(faults, code) ? faults[code] : undefined;
  return known ?? { found: code === "" ? "a fault of the system" : code, remedy: "choose another place" };
}
