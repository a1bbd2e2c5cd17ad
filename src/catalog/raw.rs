//! What every catalogue file is made of: values with status and source, and the refusal of anything less.

use std::collections::BTreeMap;

use serde::{Deserialize, de::DeserializeOwned};

use crate::{
    catalog::records::{Datum, Status},
    numerics::distribution::Shape,
};

/// Why a catalogue file is refused.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[error("catalogue, {place}: {what}")]
pub struct CatalogFault {
    /// Record or file.
    pub place: String,
    /// What is wrong with it.
    pub what: String,
}

impl CatalogFault {
    /// A fault at a record.
    pub(super) fn new(place: &str, what: impl Into<String>) -> Self {
        Self {
            place: place.to_owned(),
            what: what.into(),
        }
    }
}

/// The text of a file as its own structs; a missing status or source ends here.
pub(super) fn parse<T: DeserializeOwned>(file: &str, text: &str) -> Result<T, CatalogFault> {
    toml::from_str(text).map_err(|fault| CatalogFault::new(file, fault.to_string()))
}

/// The content of an embedded file.
pub(super) fn embedded<T>(read: Result<T, CatalogFault>) -> T {
    read.expect("the embedded catalogue is read whole by tests/catalog.rs")
}

/// Status as the files write it.
#[derive(Clone, Copy, Debug, Deserialize)]
#[serde(rename_all = "lowercase")]
pub(super) enum RawStatus {
    Seen,
    Memory,
    Computed,
    Judgement,
}

impl From<RawStatus> for Status {
    fn from(raw: RawStatus) -> Self {
        match raw {
            RawStatus::Seen => Self::Seen,
            RawStatus::Memory => Self::Memory,
            RawStatus::Computed => Self::Computed,
            RawStatus::Judgement => Self::Judgement,
        }
    }
}

/// Where a value or a whole record comes from.
#[derive(Clone, Debug, Deserialize)]
pub(super) struct RawOrigin {
    pub(super) status: RawStatus,
    pub(super) source: String,
    pub(super) of: Option<String>,
}

/// A status with its source written out.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Origin {
    pub(super) status: Status,
    pub(super) source: String,
}

/// The `[sources]` table of a file: key to readable name.
#[derive(Clone, Debug, Deserialize)]
#[serde(transparent)]
pub(super) struct Sources(BTreeMap<String, String>);

impl Sources {
    /// The readable source, with what exactly stands there.
    pub(super) fn name(&self, key: &str, of: Option<&str>) -> Result<String, CatalogFault> {
        let name = self
            .0
            .get(key)
            .ok_or_else(|| CatalogFault::new(key, "no such key in [sources]"))?;
        Ok(match of {
            Some(of) => format!("{name}: {of}"),
            None => name.clone(),
        })
    }

    /// An origin with its source written out.
    pub(super) fn origin(&self, raw: &RawOrigin) -> Result<Origin, CatalogFault> {
        Ok(Origin {
            status: raw.status.into(),
            source: self.name(&raw.source, raw.of.as_deref())?,
        })
    }
}

/// A value in the unit its key names.
#[derive(Clone, Debug, Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct RawDatum {
    value: f64,
    range: Option<[f64; 2]>,
    status: RawStatus,
    source: String,
    of: Option<String>,
}

/// Turns the values of one record into SI and names the record when one is refused.
pub(super) struct Values<'a> {
    pub(super) record: &'a str,
    pub(super) sources: &'a Sources,
}

impl Values<'_> {
    /// A value times the SI size of its unit; refused unless positive and inside its range.
    pub(super) fn datum(&self, raw: &RawDatum, unit: f64) -> Result<Datum, CatalogFault> {
        let [low, high] = raw.range.unwrap_or([raw.value; 2]);
        if !(0.0 < low && low <= raw.value && raw.value <= high && high.is_finite()) {
            let what = format!("0 < {low} ≤ {} ≤ {high} does not hold", raw.value);
            return Err(CatalogFault::new(self.record, what));
        }
        Ok(Datum {
            value: raw.value * unit,
            range: raw.range.map(|range| range.map(|end| end * unit)),
            shape: Shape::Uniform,
            status: raw.status.into(),
            source: self.sources.name(&raw.source, raw.of.as_deref())?,
        })
    }

    /// The same for a value that may be absent.
    pub(super) fn maybe(
        &self,
        raw: Option<&RawDatum>,
        unit: f64,
    ) -> Result<Option<Datum>, CatalogFault> {
        raw.map(|raw| self.datum(raw, unit)).transpose()
    }

    /// Points whose first numbers rise from at least zero and whose second are positive, in SI.
    pub(super) fn points(
        &self,
        raw: &[[f64; 2]],
        units: [f64; 2],
    ) -> Result<Vec<(f64, f64)>, CatalogFault> {
        let rising = raw.windows(2).all(|pair| pair[0][0] < pair[1][0]);
        let sound = raw
            .iter()
            .all(|[x, y]| *x >= 0.0 && *y > 0.0 && x.is_finite() && y.is_finite());
        if !(rising && sound) {
            return Err(CatalogFault::new(
                self.record,
                "points must rise and be positive",
            ));
        }
        Ok(raw
            .iter()
            .map(|[x, y]| (x * units[0], y * units[1]))
            .collect())
    }

    /// Numbers that must all be positive, in SI.
    pub(super) fn positive(&self, raw: &[f64], unit: f64) -> Result<Vec<f64>, CatalogFault> {
        if raw.iter().all(|value| *value > 0.0 && value.is_finite()) {
            Ok(raw.iter().map(|value| value * unit).collect())
        } else {
            Err(CatalogFault::new(self.record, "a number is not positive"))
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn datum(text: &str) -> Result<Datum, CatalogFault> {
        let sources: Sources = parse("sources", "book = \"a book\"")?;
        let raw: RawDatum = parse("datum", text)?;
        Values {
            record: "test",
            sources: &sources,
        }
        .datum(&raw, 1e6)
    }

    #[test]
    fn a_value_comes_in_si_with_its_source_written_out() {
        let read = datum(
            "value = 3\nrange = [2, 4]\nstatus = \"seen\"\nsource = \"book\"\nof = \"page 5\"",
        )
        .unwrap();
        assert_eq!(
            (Some(read.value), read.range),
            (Some(3e6), Some([2e6, 4e6]))
        );
        assert_eq!(read.status, Status::Seen);
        assert_eq!(read.source, "a book: page 5");
    }

    #[test]
    fn a_value_without_status_or_source_is_refused() {
        assert!(datum("value = 3\nsource = \"book\"").is_err());
        assert!(datum("value = 3\nstatus = \"seen\"").is_err());
        assert!(datum("value = 3\nstatus = \"seen\"\nsource = \"letter\"").is_err());
        assert!(datum("value = 3\nstatus = \"certain\"\nsource = \"book\"").is_err());
    }

    #[test]
    fn a_value_must_be_positive_and_inside_its_range() {
        for numbers in [
            "value = 0",
            "value = -1",
            "value = nan",
            "value = inf",
            "value = 3\nrange = [4, 2]",
            "value = 3\nrange = [1, 2]",
            "value = 3\nrange = [0, 4]",
        ] {
            let text = format!("{numbers}\nstatus = \"seen\"\nsource = \"book\"");
            assert!(datum(&text).is_err(), "{numbers}");
        }
    }

    #[test]
    fn points_must_rise() {
        let sources = Sources(BTreeMap::new());
        let values = Values {
            record: "test",
            sources: &sources,
        };
        assert!(values.points(&[[0.0, 1.0], [1.0, 2.0]], [1.0; 2]).is_ok());
        assert!(values.points(&[[1.0, 1.0], [1.0, 2.0]], [1.0; 2]).is_err());
        assert!(values.points(&[[0.0, 0.0]], [1.0; 2]).is_err());
    }
}
