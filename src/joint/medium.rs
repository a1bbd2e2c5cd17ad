//! Media by the words of joint files.

use crate::{
    catalog, diagnostic,
    joint::{Medium, service::ATMOSPHERE},
};

const VACUUM: &str = "vacuum";

impl Medium {
    /// The medium of a word, a gas at an absolute pressure, Pa, or at the standard atmosphere.
    ///
    /// Error: a sentence that names what is known.
    ///
    /// Checked: `media_are_known_by_the_words_of_the_file`.
    pub fn named(word: &str, pressure: Option<f64>) -> Result<Self, String> {
        let word = word.trim();
        if word.eq_ignore_ascii_case(VACUUM) {
            return Ok(Self::Vacuum);
        }
        if let Some(gas) = catalog::gas(word) {
            return Ok(Self::Gas {
                gas: gas.clone(),
                pressure: pressure.unwrap_or(ATMOSPHERE),
            });
        }
        let gases = catalog::gases().iter().map(|gas| gas.name.to_lowercase());
        let known: Vec<String> = std::iter::once(VACUUM.to_owned()).chain(gases).collect();
        let meant = diagnostic::nearest(word, known.iter().map(String::as_str));
        let hint = meant.map_or_else(String::new, |name| format!("did you mean `{name}`? "));
        Err(format!(
            "no medium is called `{word}`; {hint}known are {}",
            known.join(", ")
        ))
    }

    /// The word of the medium.
    pub fn word(&self) -> String {
        match self {
            Self::Vacuum => VACUUM.to_owned(),
            Self::Gas { gas, .. } => gas.name.to_lowercase(),
        }
    }

    /// Absolute pressure of the gas, Pa; none in vacuum.
    pub fn pressure(&self) -> Option<f64> {
        match self {
            Self::Vacuum => None,
            Self::Gas { pressure, .. } => Some(*pressure),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn media_are_known_by_the_words_of_the_file() {
        assert_eq!(Medium::named("Vacuum", None), Ok(Medium::Vacuum));
        for gas in catalog::gases() {
            let medium = Medium::named(&gas.name, Some(50e3)).expect("a gas of the catalogue");
            assert_eq!(medium.pressure(), Some(50e3));
            assert_eq!(Medium::named(&medium.word(), Some(50e3)), Ok(medium));
        }
        let told = Medium::named("heluim", None).expect_err("a slip");
        assert!(told.contains("did you mean `helium`"), "{told}");
    }
}
