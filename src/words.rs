//! Enums whose values are words of a case file.

macro_rules! words {
    ($(#[$doc:meta])* $name:ident: $what:literal { $($variant:ident = $word:literal,)* }) => {
        $(#[$doc])*
        #[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
        #[allow(missing_docs, reason = "the names say it")]
        pub enum $name { $($variant,)* }

        impl $name {
            /// All of them.
            pub const ALL: &'static [Self] = &[$(Self::$variant,)*];

            /// The word in case files and JSON.
            #[must_use]
            pub const fn id(self) -> &'static str {
                match self { $(Self::$variant => $word,)* }
            }
        }

        impl std::fmt::Display for $name {
            fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
                f.write_str(self.id())
            }
        }

        impl std::str::FromStr for $name {
            type Err = String;

            fn from_str(text: &str) -> Result<Self, String> {
                Self::ALL.iter().copied().find(|one| one.id() == text.trim()).ok_or_else(|| {
                    let words: Vec<&str> = Self::ALL.iter().map(|one| one.id()).collect();
                    format!("`{text}` is no {}; write one of {}", $what, words.join(", "))
                })
            }
        }
    };
}
pub(crate) use words;
