//! Roughness as drawings give it: `Ra 0.8 µm`, `Rq 1.1 µm`, `Rz 6.3 µm`, `N7`.

use crate::units::{Quantity, UnitFault, fix, parse};

/// Root-mean-square over mean roughness, Rq/Ra, 1.
///
/// ```text
/// Rq/Ra = √(π/2) = 1.2533
/// ```
///
/// Valid: heights with a Gaussian distribution, for which it is exact; worn or turned faces differ.
/// Source: moments of the normal distribution.
pub const RMS_OVER_MEAN: f64 = 1.253_314_137_315_5;

/// Ten-point height over mean roughness, Rz/Ra, 1.
///
/// The trade reckons with 4 to 7, depending on how the face was cut; this is the geometric middle,
/// so that the truth lies within a factor 1.32 either way.
/// Source: workshop practice, from memory; no standard fixes the ratio.
pub const RZ_OVER_RA: f64 = 5.3;

/// Roughness grades of ISO 1302 as Ra, µm: N1 to N12. From memory.
const GRADES: [f64; 12] = [
    0.025, 0.05, 0.1, 0.2, 0.4, 0.8, 1.6, 3.2, 6.3, 12.5, 25.0, 50.0,
];

/// Largest Rq that is read, m: four times the roughest grade. A larger one is a slip of the unit.
const ROUGHEST: f64 = 200e-6;

/// A roughness, and what had to be assumed to read it.
#[derive(Clone, Debug, PartialEq)]
pub struct Roughness {
    /// Root-mean-square roughness, m.
    pub rq: f64,
    /// The step from what was written to Rq, when there was one.
    pub assumed: Option<String>,
}

/// The roughness parameters that are read.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Parameter {
    Rq,
    Ra,
    Rz,
}

/// Reads a roughness with the name of its parameter, before or after the value.
///
/// `0.8 µm` alone is refused: Ra and Rz of one face differ about fivefold.
/// Checked: `grade_seven_is_ra_1_6`, `ra_becomes_rq_by_the_gaussian_ratio`.
pub fn parse_roughness(text: &str) -> Result<Roughness, UnitFault> {
    let text = text.trim();
    if let Some(grade) = grade(text) {
        return grade;
    }
    if text.parse::<f64>().is_ok() {
        return Err(bare(text));
    }
    let Some((parameter, value)) = parameter(text) else {
        return Err(nameless(text));
    };
    if value.is_empty() {
        return Err(UnitFault::new(
            format!(
                "{} has no value; a roughness is expected",
                fix::quoted(text)
            ),
            "write it such as `Ra 0.8 µm` or `Ra 32 µin`".to_owned(),
        ));
    }
    if value.parse::<f64>().is_ok() {
        return Err(UnitFault::new(
            format!("{} has no unit; a roughness is expected", fix::quoted(text)),
            "write it such as `Ra 0.8 µm` or `Ra 32 µin`".to_owned(),
        ));
    }
    let height = parse(value, Quantity::Length).map_err(|fault| UnitFault {
        help: Some("write a roughness such as `Ra 0.8 µm` or `Rq 1.1 µm`".to_owned()),
        ..fault
    })?;
    let (rq, assumed) = match parameter {
        Parameter::Rq => (height, None),
        Parameter::Ra => (
            height * RMS_OVER_MEAN,
            Some("Rq = 1.2533 Ra, heights taken as Gaussian".to_owned()),
        ),
        Parameter::Rz => (
            height / RZ_OVER_RA * RMS_OVER_MEAN,
            Some(
                "Ra = Rz/5.3, the geometric middle of the 4 to 7 of workshop practice (from \
                 memory, a factor 1.32 either way); Rq = 1.2533 Ra, heights taken as Gaussian"
                    .to_owned(),
            ),
        ),
    };
    checked(text, rq, assumed)
}

fn checked(text: &str, rq: f64, assumed: Option<String>) -> Result<Roughness, UnitFault> {
    if rq <= 0.0 {
        return Err(UnitFault::new(
            format!(
                "{} is not above zero; no face is perfectly smooth",
                fix::quoted(text)
            ),
            "the smoothest lapped faces reach about `Ra 0.02 µm`".to_owned(),
        ));
    }
    if rq > ROUGHEST {
        return Err(UnitFault::new(
            format!(
                "{} is rougher than any machined or cast face",
                fix::quoted(text)
            ),
            "roughness is stated in micrometres or microinches: `Ra 0.8 µm`, `Ra 32 µin`"
                .to_owned(),
        ));
    }
    Ok(Roughness { rq, assumed })
}

/// `N1` to `N12`; none when the text is something else.
fn grade(text: &str) -> Option<Result<Roughness, UnitFault>> {
    let number = text.strip_prefix(['N', 'n'])?.trim_start();
    if number.is_empty() || !number.bytes().all(|byte| byte.is_ascii_digit()) {
        return None;
    }
    let known = number
        .parse::<usize>()
        .ok()
        .and_then(|number| GRADES.get(number.checked_sub(1)?));
    Some(match known {
        Some(ra) => Ok(Roughness {
            rq: ra * 1e-6 * RMS_OVER_MEAN,
            assumed: Some(format!(
                "N{number} is Ra {ra} µm (grades of ISO 1302, from memory); Rq = 1.2533 Ra, \
                 heights taken as Gaussian"
            )),
        }),
        None => Err(UnitFault::new(
            format!(
                "{} is not a roughness grade; N1 to N12 are",
                fix::quoted(text)
            ),
            "write `N7`, or the value itself: `Ra 1.6 µm`".to_owned(),
        )),
    })
}

/// The parameter a text names, and the rest of the text.
fn parameter(text: &str) -> Option<(Parameter, &str)> {
    let names = [
        ("rms", Parameter::Rq),
        ("rq", Parameter::Rq),
        ("ra", Parameter::Ra),
        ("rz", Parameter::Rz),
    ];
    names.into_iter().find_map(|(name, parameter)| {
        let front = text
            .get(..name.len())
            .filter(|front| front.eq_ignore_ascii_case(name));
        if front.is_some() {
            let value = text[name.len()..].trim_start_matches(['=', ':', ' ']);
            return Some((parameter, value.trim()));
        }
        let start = text.len().checked_sub(name.len())?;
        let back = text
            .get(start..)
            .filter(|back| back.eq_ignore_ascii_case(name));
        back.map(|_| (parameter, text[..start].trim()))
    })
}

/// A roughness without a unit.
fn bare(text: &str) -> UnitFault {
    UnitFault {
        code: "unit/bare-number",
        message: format!("{} has no unit; a roughness is expected", fix::quoted(text)),
        help: Some("write it such as `Ra 0.8 µm` or `Ra 32 µin`".to_owned()),
    }
}

/// A roughness that does not say which parameter it is.
fn nameless(text: &str) -> UnitFault {
    let found = fix::quoted(text);
    let other = ["rt", "ry", "rmax", "rp", "sa", "sq", "cla", "aa"]
        .into_iter()
        .any(|name| text.to_lowercase().starts_with(name));
    if other {
        return UnitFault::new(
            format!("{found} is not one of the roughness parameters Ra, Rq and Rz"),
            "give the face's Ra, Rq or Rz, such as `Ra 0.8 µm`".to_owned(),
        );
    }
    match parse(text, Quantity::Length) {
        Ok(_) => UnitFault::new(
            format!("{found} does not say which roughness it is; Rz is about five times Ra"),
            format!("write `Ra {text}`, `Rq {text}` or `Rz {text}`"),
        ),
        Err(_) => UnitFault::new(
            format!("{found} is not a roughness"),
            "write a roughness such as `Ra 0.8 µm`, `Rq 1.1 µm`, `Rz 6.3 µm` or `N7`".to_owned(),
        ),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn ra_becomes_rq_by_the_gaussian_ratio() {
        let read = parse_roughness("Ra 0.8 µm").unwrap();
        // √(π/2) to the twelve digits of the constant.
        assert!((read.rq / 0.8e-6 - std::f64::consts::FRAC_PI_2.sqrt()).abs() < 1e-12);
        assert!(read.assumed.unwrap().contains("Gaussian"));
    }

    #[test]
    fn spellings_of_one_roughness_read_alike() {
        let rq = parse_roughness("Ra 0.8 µm").unwrap().rq;
        for text in [
            "Ra0.8µm",
            "ra 0.8 um",
            "Ra = 0.8 µm",
            "0.8 µm Ra",
            "Ra 800 nm",
            "N6",
        ] {
            let read = parse_roughness(text).unwrap();
            // Rounding of one multiplication.
            assert!((read.rq / rq - 1.0).abs() < 1e-14, "{text}");
        }
    }

    #[test]
    fn grade_seven_is_ra_1_6() {
        // ISO 1302 grades, from memory.
        let read = parse_roughness("N7").unwrap();
        assert!((read.rq / (1.6e-6 * RMS_OVER_MEAN) - 1.0).abs() < 1e-14);
    }

    #[test]
    fn rq_is_taken_as_it_stands() {
        let read = parse_roughness("Rq 1.1 µm").unwrap();
        assert_eq!(
            read,
            Roughness {
                rq: 1.1 * 1e-6,
                assumed: None
            }
        );
    }

    #[test]
    fn rz_says_what_it_assumes() {
        let read = parse_roughness("Rz 5.3 µm").unwrap();
        assert!((read.rq / (1e-6 * RMS_OVER_MEAN) - 1.0).abs() < 1e-14);
        assert!(read.assumed.unwrap().contains("4 to 7"));
    }

    #[test]
    fn microinches_are_read() {
        let read = parse_roughness("Ra 32 µin").unwrap();
        assert!((read.rq / (0.8128e-6 * RMS_OVER_MEAN) - 1.0).abs() < 1e-12);
    }

    #[test]
    fn faults_name_the_fix() {
        for (text, message, help) in [
            ("0.8 µm", "does not say which roughness", "`Ra 0.8 µm`"),
            ("Ra 0.8", "has no unit", "`Ra 0.8 µm`"),
            ("0.8", "has no unit", "`Ra 0.8 µm`"),
            ("Ra", "has no value", "`Ra 0.8 µm`"),
            ("N13", "N1 to N12", "`N7`"),
            ("Rt 5 µm", "Ra, Rq and Rz", "`Ra 0.8 µm`"),
            ("Ra 0.8 mm", "rougher than any", "micrometres"),
            ("Ra 0 µm", "not above zero", "lapped"),
            ("Ra 0,8 µm", "comma", "`Ra 0.8 µm`"),
            ("ground", "is not a roughness", "`N7`"),
            ("Ra 0.8 N", "is a force", "`Ra 0.8 µm`"),
        ] {
            let fault = parse_roughness(text).unwrap_err();
            assert!(fault.message.contains(message), "{text}: {fault}");
            assert!(fault.help.unwrap().contains(help), "{text}");
        }
    }
}
