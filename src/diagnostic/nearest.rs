//! The known name that a mistyped one was meant to be.

/// Longest name compared, characters; a longer one is no slip of a known name.
const LONGEST: usize = 64;

/// The known name nearest to `name`, when it is near enough to be a slip.
///
/// Near is at most one edit in three characters; an edit inserts, drops or changes a character or
/// swaps two neighbours. Upper and lower case, `_`, `-` and spaces make no difference.
/// Of equally near names the first one wins.
pub fn nearest<'a>(name: &str, known: impl Iterator<Item = &'a str>) -> Option<String> {
    let name = plain(name);
    if name.is_empty() || name.len() > LONGEST {
        return None;
    }
    known
        .filter_map(|candidate| {
            let letters = plain(candidate);
            if letters.len() > LONGEST {
                return None;
            }
            let edits = edits(&name, &letters);
            let allowed = name.len().max(letters.len()) / 3;
            (edits <= allowed && edits < letters.len()).then_some((edits, candidate))
        })
        .min_by_key(|&(edits, _)| edits)
        .map(|(_, candidate)| candidate.to_owned())
}

/// The characters that count.
fn plain(name: &str) -> Vec<char> {
    name.chars()
        .filter(|sign| !matches!(sign, '_' | '-' | ' '))
        .flat_map(char::to_lowercase)
        .take(LONGEST + 1)
        .collect()
}

/// Least number of edits from one name to the other (optimal string alignment).
fn edits(from: &[char], to: &[char]) -> usize {
    let mut two_ago: Vec<usize> = Vec::new();
    let mut last: Vec<usize> = (0..=to.len()).collect();
    for (i, &have) in from.iter().enumerate() {
        let mut row = vec![i + 1];
        for (j, &want) in to.iter().enumerate() {
            let changed = last[j] + usize::from(have != want);
            let mut fewest = changed.min(last[j + 1] + 1).min(row[j] + 1);
            if 0 < i && 0 < j && have == to[j - 1] && want == from[i - 1] {
                fewest = fewest.min(two_ago[j - 1] + 1);
            }
            row.push(fewest);
        }
        two_ago = std::mem::replace(&mut last, row);
    }
    last[to.len()]
}

#[cfg(test)]
mod tests {
    use super::*;

    const KEYS: [&str; 6] = [
        "torque",
        "thread",
        "thickness",
        "material",
        "at",
        "head_model",
    ];

    fn guess(name: &str) -> Option<String> {
        nearest(name, KEYS.into_iter())
    }

    #[test]
    fn slips_find_their_key() {
        for (slip, key) in [
            ("torqe", "torque"),
            ("troque", "torque"),
            ("thicknes", "thickness"),
            ("Material", "material"),
            ("headmodel", "head_model"),
            ("__at__", "at"),
        ] {
            assert_eq!(guess(slip).as_deref(), Some(key), "{slip}");
        }
    }

    #[test]
    fn strangers_find_nothing() {
        for stranger in ["", "colour", "x", "zz", &"torque".repeat(40)] {
            assert_eq!(guess(stranger), None, "{stranger}");
        }
    }

    #[test]
    fn a_swap_of_neighbours_is_one_edit() {
        assert_eq!(edits(&plain("ab"), &plain("ba")), 1);
        assert_eq!(edits(&plain("kitten"), &plain("sitting")), 3);
    }
}
