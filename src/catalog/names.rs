//! How names are compared, and look-up by name.

use std::collections::BTreeMap;

use crate::catalog::raw::CatalogFault;

/// A name without what people write differently: case, spaces, dashes, commas and two spellings.
pub(super) fn plain(name: &str) -> String {
    name.chars()
        .filter(|c| !c.is_whitespace() && !matches!(c, '-' | '‐' | '‑' | '–' | '—' | '_' | ','))
        .flat_map(char::to_lowercase)
        .collect::<String>()
        .replace("aluminum", "aluminium")
        .replace("anodiz", "anodis")
}

/// Position of each record by every name it answers to.
#[derive(Debug, Default)]
pub(super) struct Index(BTreeMap<String, usize>);

impl Index {
    /// Enters a record under one more name.
    pub(super) fn enter(&mut self, name: &str, record: usize) -> Result<(), CatalogFault> {
        let key = plain(name);
        if key.is_empty() {
            return Err(CatalogFault::new(name, "a record has an empty name"));
        }
        match self.0.insert(key, record) {
            None => Ok(()),
            Some(_) => Err(CatalogFault::new(
                name,
                "two records answer to this name, or one twice",
            )),
        }
    }

    /// Enters a record under its name and its aliases.
    pub(super) fn enter_all(
        &mut self,
        name: &str,
        aliases: &[String],
        record: usize,
    ) -> Result<(), CatalogFault> {
        self.enter(name, record)?;
        aliases
            .iter()
            .try_for_each(|alias| self.enter(alias, record))
    }

    /// The record of a name.
    pub(super) fn find(&self, name: &str) -> Option<usize> {
        self.0.get(&plain(name)).copied()
    }
}

/// Records in file order, found by name.
#[derive(Debug)]
pub(super) struct Shelf<T> {
    /// The records.
    pub(super) records: Vec<T>,
    index: Index,
}

impl<T> Shelf<T> {
    /// Shelves records under their names.
    pub(super) fn new<'a>(
        records: Vec<T>,
        names: impl Iterator<Item = (&'a str, &'a [String])>,
    ) -> Result<Self, CatalogFault> {
        let mut index = Index::default();
        for (place, (name, aliases)) in names.enumerate() {
            index.enter_all(name, aliases, place)?;
        }
        Ok(Self { records, index })
    }

    /// The record of a name.
    pub(super) fn find(&self, name: &str) -> Option<&T> {
        self.index.find(name).map(|place| &self.records[place])
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn case_spaces_and_dashes_do_not_matter() {
        assert_eq!(plain("EN AW-6061 T6"), plain("en aw 6061‑t6"));
        assert_eq!(plain("Aluminum 6061-T6"), plain("Aluminium 6061 T6"));
        assert_ne!(plain("Alumina 99.5 %"), plain("Alumina 995 %"));
    }

    #[test]
    fn a_name_is_given_once() {
        let mut index = Index::default();
        assert!(index.enter_all("304", &["1.4301".into()], 0).is_ok());
        assert!(index.enter("AISI 304", 0).is_ok());
        assert!(index.enter("aisi-304", 1).is_err());
        assert!(index.enter(" - ", 1).is_err());
        assert_eq!(index.find("1.4301"), Some(0));
    }
}
