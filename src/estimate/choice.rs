//! Which pressure field a chain stands on, how finely it is solved, and who watches.

use std::{fmt, sync::Arc};

/// What stands for the pressure between the faces.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Choice {
    /// Closed form around every bolt: milliseconds, neither gap nor bow nor edges.
    #[default]
    Cone,
    /// Elastic contact of the whole plates.
    Elastic {
        /// How finely.
        fineness: Fineness,
        /// Most memory the solution may take, bytes.
        memory: u64,
    },
}

/// How finely an elastic field is solved.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Fineness {
    /// A preview: gaps within 8 % on the reference joints.
    Fast,
    /// For work.
    Normal,
    /// For the record: gaps within 3 % on the reference joints.
    Fine,
}

impl Fineness {
    /// As users write it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Fast => "fast",
            Self::Normal => "normal",
            Self::Fine => "fine",
        }
    }
}

impl Choice {
    /// An elastic field of some fineness within some bytes of memory.
    pub const fn elastic(fineness: Fineness, memory: u64) -> Self {
        Self::Elastic { fineness, memory }
    }
}

/// Who is told how far a long solution has come.
#[derive(Clone, Default)]
pub struct Watch(Option<Arc<Tell>>);

/// Takes a line of text.
type Tell = dyn Fn(&str) + Send + Sync;

impl Watch {
    /// Nobody.
    pub const fn none() -> Self {
        Self(None)
    }

    /// Whoever takes a line of text; an empty line ends the telling.
    pub fn telling(tell: impl Fn(&str) + Send + Sync + 'static) -> Self {
        Self(Some(Arc::new(tell)))
    }

    /// Tells.
    pub fn tell(&self, line: &str) {
        if let Some(tell) = &self.0 {
            tell(line);
        }
    }
}

impl fmt::Debug for Watch {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        out.write_str(if self.0.is_some() {
            "Watch(someone)"
        } else {
            "Watch(nobody)"
        })
    }
}
