//! Plate materials: read from `materials.toml`.

use std::{collections::BTreeMap, sync::OnceLock};

use serde::Deserialize;

use crate::catalog::{
    names::{Shelf, plain},
    raw::{CatalogFault, RawDatum, RawOrigin, RawStatus, Sources, Values, embedded, parse},
    records::{ConductivityFit, Datum, FitForm, Material, MaterialKind},
};

/// Mean pressure over the projected area of a Vickers indent per unit of HV, Pa.
///
/// ```text
/// HV [kgf/mm²] counts the sloping faces, Meyer the projected area: factor 1/sin 68° = 1.0785
/// ```
const MEYER_PER_VICKERS: f64 = 9.806_65e6 * 1.0785;

/// All materials.
pub fn materials() -> &'static [Material] {
    &shelves().materials.records
}

/// A material by trade name or alias.
pub fn material(name: &str) -> Option<&'static Material> {
    shelves().materials.find(name)
}

/// A published fit of conductivity by name, for materials that a joint file describes itself.
pub fn fit(name: &str) -> Option<&'static ConductivityFit> {
    shelves().fits.get(&plain(name)).map(|(_, fit)| fit)
}

/// Names of the fits.
pub fn fit_names() -> impl Iterator<Item = &'static str> {
    shelves().fits.values().map(|(name, _)| name.as_str())
}

type Fits = BTreeMap<String, (String, ConductivityFit)>;
type Contractions = BTreeMap<String, Vec<(f64, f64)>>;

#[derive(Debug)]
pub(super) struct Shelves {
    materials: Shelf<Material>,
    fits: Fits,
}

fn shelves() -> &'static Shelves {
    static SHELVES: OnceLock<Shelves> = OnceLock::new();
    SHELVES.get_or_init(|| embedded(read(include_str!("materials.toml"))))
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    sources: Sources,
    material: Vec<RawMaterial>,
    fit: Vec<RawFit>,
    contraction: Vec<RawContraction>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawMaterial {
    name: String,
    aliases: Vec<String>,
    kind: RawKind,
    family: String,
    #[serde(rename = "conductivity_W_mK")]
    conductivity: RawDatum,
    #[serde(rename = "youngs_modulus_GPa")]
    youngs_modulus: RawDatum,
    poisson: RawDatum,
    #[serde(rename = "expansion_um_mK")]
    expansion: RawDatum,
    #[serde(rename = "density_kg_m3")]
    density: Option<RawDatum>,
    #[serde(rename = "vickers_HV")]
    vickers: Option<RawDatum>,
    #[serde(rename = "meyer_hardness_MPa")]
    meyer_hardness: Option<RawDatum>,
    #[serde(rename = "yield_strength_MPa")]
    yield_strength: Option<RawDatum>,
    #[serde(rename = "bearing_limit_MPa")]
    bearing_limit: Option<RawDatum>,
    microhardness: Option<RawMicrohardness>,
    conductivity_fit: Option<String>,
    contraction: Option<String>,
    note: Option<String>,
}

#[derive(Clone, Copy, Deserialize)]
#[serde(rename_all = "lowercase")]
enum RawKind {
    Metal,
    Brittle,
    Polymer,
    Graphite,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawMicrohardness {
    #[serde(rename = "c1_GPa")]
    c1: f64,
    c2: f64,
    // Read so that a record without them is refused; the record itself has no place for them.
    #[serde(rename = "status")]
    _status: RawStatus,
    source: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawFit {
    name: String,
    form: RawForm,
    coefficients: Vec<f64>,
    #[serde(rename = "valid_K")]
    valid: [f64; 2],
    status: RawStatus,
    source: String,
    of: Option<String>,
}

#[derive(Clone, Copy, Deserialize)]
#[serde(rename_all = "kebab-case")]
enum RawForm {
    LogPolynomial,
    CopperRational,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct RawContraction {
    name: String,
    #[serde(rename = "temperatures_K")]
    temperatures: Vec<f64>,
    contraction_percent: Vec<f64>,
    status: RawStatus,
    source: String,
    of: Option<String>,
}

pub(super) fn read(text: &str) -> Result<Shelves, CatalogFault> {
    let file: File = parse("materials.toml", text)?;
    let fits = fits(&file)?;
    let contractions = contractions(&file)?;
    let materials = file
        .material
        .iter()
        .map(|raw| checked(raw, &file.sources, (&fits, &contractions)))
        .collect::<Result<Vec<_>, _>>()?;
    let names = file
        .material
        .iter()
        .map(|raw| (raw.name.as_str(), raw.aliases.as_slice()));
    Ok(Shelves {
        materials: Shelf::new(materials, names)?,
        fits,
    })
}

fn checked(
    raw: &RawMaterial,
    sources: &Sources,
    (fits, contractions): (&Fits, &Contractions),
) -> Result<Material, CatalogFault> {
    let values = Values {
        record: &raw.name,
        sources,
    };
    let poisson = values.datum(&raw.poisson, 1.0)?;
    if poisson.value >= 0.5 {
        return Err(CatalogFault::new(&raw.name, "Poisson's ratio is below 0.5"));
    }
    Ok(Material {
        name: raw.name.clone(),
        aliases: raw.aliases.clone(),
        kind: match raw.kind {
            RawKind::Metal => MaterialKind::Metal,
            RawKind::Brittle => MaterialKind::Brittle,
            RawKind::Polymer => MaterialKind::Polymer,
            RawKind::Graphite => MaterialKind::Graphite,
        },
        family: raw.family.clone(),
        conductivity: values.datum(&raw.conductivity, 1.0)?,
        conductivity_fit: named(raw.conductivity_fit.as_deref(), &raw.name, |key| {
            fits.get(&plain(key)).map(|(_, fit)| fit.clone())
        })?,
        through: None,
        youngs_modulus: values.datum(&raw.youngs_modulus, 1e9)?,
        poisson,
        expansion: values.datum(&raw.expansion, 1e-6)?,
        contraction: named(raw.contraction.as_deref(), &raw.name, |key| {
            contractions.get(key).cloned()
        })?,
        density: values.maybe(raw.density.as_ref(), 1.0)?,
        hardness: hardness(raw, &values)?,
        microhardness: microhardness(raw, sources)?,
        microhardness_spread: None,
        yield_strength: values.maybe(raw.yield_strength.as_ref(), 1e6)?,
        bearing_limit: values.maybe(raw.bearing_limit.as_ref(), 1e6)?,
        note: raw.note.clone(),
    })
}

/// The entry a record refers to by name; refused when there is no such entry.
fn named<T>(
    key: Option<&str>,
    record: &str,
    find: impl Fn(&str) -> Option<T>,
) -> Result<Option<T>, CatalogFault> {
    key.map(|key| {
        find(key).ok_or_else(|| CatalogFault::new(record, format!("there is no `{key}`")))
    })
    .transpose()
}

fn hardness(raw: &RawMaterial, values: &Values) -> Result<Option<Datum>, CatalogFault> {
    match (&raw.vickers, &raw.meyer_hardness) {
        (Some(_), Some(_)) => Err(CatalogFault::new(&raw.name, "hardness is given twice")),
        (Some(vickers), None) => values.datum(vickers, MEYER_PER_VICKERS).map(Some),
        (None, meyer) => values.maybe(meyer.as_ref(), 1e6),
    }
}

fn microhardness(raw: &RawMaterial, sources: &Sources) -> Result<Option<[f64; 2]>, CatalogFault> {
    let Some(micro) = &raw.microhardness else {
        return Ok(None);
    };
    sources.name(&micro.source, None)?;
    // Beyond these bounds the exponent 1/(1 + 0.071 c₂) of the microhardness law loses its meaning.
    if micro.c1 > 0.0 && -1.0 < micro.c2 && micro.c2 <= 0.0 {
        Ok(Some([micro.c1 * 1e9, micro.c2]))
    } else {
        Err(CatalogFault::new(
            &raw.name,
            "c₁ > 0 and −1 < c₂ ≤ 0 must hold",
        ))
    }
}

fn fits(file: &File) -> Result<Fits, CatalogFault> {
    let mut fits = Fits::new();
    for raw in &file.fit {
        let origin = file.sources.origin(&RawOrigin {
            status: raw.status,
            source: raw.source.clone(),
            of: raw.of.clone(),
        })?;
        if !(0.0 < raw.valid[0] && raw.valid[0] < raw.valid[1] && raw.coefficients.len() == 9) {
            let what = "a fit has nine coefficients and a rising range";
            return Err(CatalogFault::new(&raw.name, what));
        }
        let fit = ConductivityFit {
            form: match raw.form {
                RawForm::LogPolynomial => FitForm::LogPolynomial,
                RawForm::CopperRational => FitForm::CopperRational,
            },
            coefficients: raw.coefficients.clone(),
            valid: raw.valid,
            source: origin.source,
        };
        let entry = (raw.name.clone(), fit);
        if fits.insert(plain(&raw.name), entry).is_some() {
            return Err(CatalogFault::new(&raw.name, "two fits have this name"));
        }
    }
    Ok(fits)
}

fn contractions(file: &File) -> Result<Contractions, CatalogFault> {
    let mut contractions = Contractions::new();
    for raw in &file.contraction {
        file.sources.origin(&RawOrigin {
            status: raw.status,
            source: raw.source.clone(),
            of: raw.of.clone(),
        })?;
        let rising = raw.temperatures.windows(2).all(|pair| pair[0] < pair[1]);
        let falling = raw
            .contraction_percent
            .windows(2)
            .all(|pair| pair[0] >= pair[1]);
        let ends = raw.temperatures.last() == Some(&293.0)
            && raw.contraction_percent.last() == Some(&0.0)
            && raw.temperatures.len() == raw.contraction_percent.len();
        if !(rising && falling && ends) {
            let what = "contraction must fall to zero at 293 K";
            return Err(CatalogFault::new(&raw.name, what));
        }
        let points = raw.temperatures.iter().zip(&raw.contraction_percent);
        let table = points.map(|(t, percent)| (*t, percent / 100.0)).collect();
        if contractions.insert(raw.name.clone(), table).is_some() {
            return Err(CatalogFault::new(
                &raw.name,
                "two contractions have this name",
            ));
        }
    }
    Ok(contractions)
}
