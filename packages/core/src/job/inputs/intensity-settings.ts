import { fail, type Place } from "../../errors/index.js";
import type { StudyIntensities } from "../../files/index.js";
import { largestMeasured, overlapInverseAngstrom } from "../../numbers/index.js";
import type { PeakKind } from "../../search/index.js";
import { remember, type Work } from "../work.js";
import { optionOf } from "./given.js";
import { numberOption } from "./number-input.js";

/** How intensities were measured and what is asked of their fit, besides what they are. */
export interface IntensitySettings {
  /** Whether the Lorentz factor is in the numbers. */
  readonly lorentz: boolean;
  readonly scale: number | null;
  /** Å⁻¹. */
  readonly resolution: number;
  /** Overall B, Å². */
  readonly displacement: number;
  /** 2θ of the detectors of a time-of-flight measurement; null at constant wavelength. */
  readonly scatteringAngleDeg: number | null;
  readonly domains: "equal" | "free";
  /** Degrees 2θ; null where no pattern is asked for. */
  readonly patternWidthDeg: number | null;
  /** Whether the intensities hold the nuclear lines at the same places. */
  readonly includesNuclear: boolean;
}

/** The same before it is known what the list holds; null is not said. */
export interface WrittenSettings {
  readonly lorentz: boolean | null;
  readonly scale: number | null;
  readonly resolution: number | null;
  readonly displacement: number | null;
  readonly scatteringAngleDeg: number | null;
  readonly domains: "equal" | "free" | null;
  readonly patternWidthDeg: number | null;
  readonly includesNuclear: boolean | null;
}

/** The settings of the options, else of the study. */
export function writtenSettings(work: Work, fromStudy: StudyIntensities | null): WrittenSettings {
  const { request } = work;
  return {
    lorentz: lorentzOption(work) ?? fromStudy?.lorentz ?? null,
    scale: numberOption(request, "scale", { above: 0, to: largestMeasured }) ?? fromStudy?.scale ?? null,
    resolution: numberOption(request, "resolution", { above: 0 }) ?? fromStudy?.resolution ?? null,
    displacement: numberOption(request, "displacement", { from: 0 }) ?? fromStudy?.displacement ?? null,
    scatteringAngleDeg:
      numberOption(request, "scatteringAngle", { above: 0, below: 180 }) ?? fromStudy?.scatteringAngleDeg ?? null,
    domains: domainsOption(work) ?? fromStudy?.domains ?? null,
    patternWidthDeg: numberOption(request, "pattern", { above: 0 }) ?? fromStudy?.patternWidthDeg ?? null,
    includesNuclear: request.includesNuclear === true ? true : (fromStudy?.includesNuclear ?? null),
  };
}

/** Held against what the list is; what neither says is decided, and that is remembered. */
export function settledSettings(
  work: Work,
  written: WrittenSettings,
  list: { readonly kind: PeakKind; readonly wavelengthAngstrom: number | null },
  where: Partial<Place>,
): IntensitySettings {
  const { scatteringAngleDeg, domains, patternWidthDeg } = written;
  const crystal = list.kind === "hkl";
  if (scatteringAngleDeg !== null) checkTimeOfFlight(list, where);
  if (domains === "free" && !crystal)
    fail("conflicting-arguments", "fractions of domains can be fitted to a single crystal only", {
      where,
      expected: "reflections by h k l",
      found: `a powder list by ${list.kind}`,
      remedy: "leave `domains` out: a powder has all domains alike",
    });
  if (patternWidthDeg !== null && (crystal || list.wavelengthAngstrom === null))
    fail(crystal ? "conflicting-arguments" : "missing-wavelength", "a pattern in 2θ needs a powder and a wavelength", {
      where,
      expected: "powder intensities with their wavelength in Å",
      found: crystal ? "reflections by h k l" : "no wavelength",
      remedy: crystal ? "leave the pattern out" : "give --wavelength, or `wavelength:` under intensities",
    });
  return {
    lorentz: lorentzOf(work, written, list, where),
    scale: written.scale,
    resolution: resolutionOf(work, written.resolution, list.kind),
    displacement: written.displacement ?? 0,
    scatteringAngleDeg,
    domains: domains ?? "equal",
    patternWidthDeg,
    includesNuclear: written.includesNuclear ?? false,
  };
}

function checkTimeOfFlight(
  { kind, wavelengthAngstrom }: { readonly kind: PeakKind; readonly wavelengthAngstrom: number | null },
  where: Partial<Place>,
): void {
  if (kind === "hkl")
    fail("conflicting-arguments", "the Lorentz factor of a time-of-flight measurement is known here for powders only", {
      where,
      expected: "powder intensities by d or q",
      found: "reflections by h k l",
      remedy: "give |F|² of the crystal, and leave the scattering angle out",
    });
  if (wavelengthAngstrom !== null)
    fail("conflicting-arguments", "a scattering angle of the detectors and a wavelength are both given", {
      where,
      expected: "the angle for time of flight, or the wavelength for a fixed one",
      found: `both, λ = ${wavelengthAngstrom} Å`,
      remedy: "leave one of them out",
    });
}

function lorentzOption({ request }: Pick<Work, "request">): boolean | null {
  const given = optionOf(request, "lorentz");
  if (given === null) return null;
  if (["yes", "true"].includes(given.text)) return true;
  if (["no", "false"].includes(given.text)) return false;
  return fail("invalid-argument", `\`${given.text}\` does not say whether the Lorentz factor is in the intensities`, {
    where: given.where,
    expected: "yes or no",
    found: given.text,
    remedy: "--lorentz yes for intensities as measured, --lorentz no for |F|²",
  });
}

function domainsOption({ request }: Pick<Work, "request">): "equal" | "free" | null {
  const given = optionOf(request, "domains");
  if (given === null || given.text === "equal" || given.text === "free") return given?.text as "equal" | "free" | null;
  return fail("invalid-argument", `\`${given.text}\` does not say what the fractions of domains are`, {
    where: given.where,
    expected: "equal or free",
    found: given.text,
    remedy: "--domains free to fit the fractions",
  });
}

/** Powder intensities with a wavelength or a scattering angle are taken as measured, all others as |F|². */
function lorentzOf(
  work: Work,
  { lorentz: asked, scatteringAngleDeg }: WrittenSettings,
  { kind, wavelengthAngstrom }: { readonly kind: PeakKind; readonly wavelengthAngstrom: number | null },
  where: Partial<Place>,
): boolean {
  const known = wavelengthAngstrom !== null || scatteringAngleDeg !== null;
  if (asked !== null) {
    if (asked && !known)
      fail("missing-wavelength", "the Lorentz factor needs the wavelength", {
        where,
        expected: "the wavelength in Å, or 2θ of the detectors for time of flight",
        found: "neither",
        remedy: "give it (--wavelength, or `wavelength:` under intensities), or say that the numbers are |F|²",
      });
    return asked;
  }
  const lorentz = kind !== "hkl" && known;
  const because = lorentz
    ? `they are powder intensities with a ${wavelengthAngstrom === null ? "scattering angle" : "wavelength"}; \`lorentz: false\` or --lorentz no says otherwise`
    : `${kind === "hkl" ? "reflections by h k l" : "no wavelength"}; \`lorentz: true\` or --lorentz yes says otherwise`;
  const value = lorentz ? "in the intensities" : "not in the numbers: they are |F|²";
  remember(work, [{ what: "Lorentz factor", value, because }], []);
  return lorentz;
}

function resolutionOf(work: Work, asked: number | null, kind: PeakKind): number {
  if (asked !== null) return asked;
  if (kind !== "hkl")
    remember(
      work,
      [
        {
          what: "resolution",
          value: `${overlapInverseAngstrom} Å⁻¹`,
          because: "neither `resolution` under intensities nor --resolution says within what lines are one peak",
        },
      ],
      [],
    );
  return overlapInverseAngstrom;
}
