//! Named columns of file attributes.

/// One named attribute of all vertices or all faces of a soup.
///
/// ```
/// use merestone_geometry::{AttributeColumn, AttributeValues};
/// let mut column = AttributeColumn::new("quality", AttributeValues::F32(vec![0.5, 0.25, 1.0]));
/// column.values.select(&[2, 0]);
/// assert_eq!(column.values, AttributeValues::F32(vec![1.0, 0.5]));
/// ```
#[derive(Clone, Debug, PartialEq)]
pub struct AttributeColumn {
    /// The name the file gives it.
    pub name: String,
    /// One value a cell.
    pub values: AttributeValues,
}

impl AttributeColumn {
    /// A column of this name.
    #[must_use]
    pub fn new(name: impl Into<String>, values: AttributeValues) -> Self {
        Self { name: name.into(), values }
    }
}

macro_rules! values {
    ($($variant:ident $type:ty),*) => {
        /// The values of a column, in the width the file has them.
        #[derive(Clone, Debug, PartialEq)]
        #[non_exhaustive]
        pub enum AttributeValues {
            $(
                #[doc = concat!("Values of type `", stringify!($type), "`.")]
                $variant(Vec<$type>),
            )*
        }

        impl AttributeValues {
            /// How many values there are.
            #[must_use]
            pub fn len(&self) -> usize {
                match self {
                    $(Self::$variant(values) => values.len(),)*
                }
            }

            /// Keeps the values at these places, in this order. Places out of range are passed over.
            pub fn select(&mut self, places: &[u32]) {
                match self {
                    $(Self::$variant(values) => {
                        *values = places
                            .iter()
                            .filter_map(|&place| values.get(place as usize).copied())
                            .collect();
                    })*
                }
            }

            /// The value at a place as a float, the same number wherever an `f64` can hold it.
            #[must_use]
            pub fn get(&self, place: usize) -> Option<f64> {
                match self {
                    $(Self::$variant(values) => values.get(place).map(|&value| value as f64),)*
                }
            }
        }
    };
}

values!(I8 i8, U8 u8, I16 i16, U16 u16, I32 i32, U32 u32, I64 i64, F32 f32, F64 f64);

impl AttributeValues {
    /// Whether there is no value.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.len() == 0
    }
}
