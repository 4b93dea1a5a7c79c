//! Where the parser puts the values of a row, and the columns they go on to.

use super::header::INDEX_LISTS;
use merestone_geometry::{AttributeColumn, AttributeValues, Note, NoteKind};
use ply_rs_bw::ply::{
    BeginList, ElementDef, PropertyAccess, PropertyAccessResult, PropertyType, ScalarType,
};

/// A scalar in the width the file has it.
#[derive(Clone, Copy, Debug)]
pub(super) enum Number {
    I8(i8),
    U8(u8),
    I16(i16),
    U16(u16),
    I32(i32),
    U32(u32),
    F32(f32),
    F64(f64),
}

impl Number {
    fn to_f64(self) -> f64 {
        match self {
            Self::I8(x) => x.into(),
            Self::U8(x) => x.into(),
            Self::I16(x) => x.into(),
            Self::U16(x) => x.into(),
            Self::I32(x) => x.into(),
            Self::U32(x) => x.into(),
            Self::F32(x) => x.into(),
            Self::F64(x) => x,
        }
    }
}

/// The parser's eight scalar setters, all into `self.set`.
macro_rules! scalar_setters {
    () => {
        scalar_setters! {
            set_char i8 => I8, set_uchar u8 => U8, set_short i16 => I16, set_ushort u16 => U16,
            set_int i32 => I32, set_uint u32 => U32, set_float f32 => F32, set_double f64 => F64,
        }
    };
    ($($setter:ident $type:ty => $number:ident),* $(,)?) => {
        $(#[inline]
        fn $setter(&mut self, name: &str, value: $type) -> PropertyAccessResult {
            self.set(name, Number::$number(value));
            PropertyAccessResult::Set
        })*
    };
}

/// A vertex: its coordinates, and its other scalars in the header's order.
#[derive(Debug)]
pub(super) struct VertexRow {
    point: [f64; 3],
    extras: Vec<Number>,
}

impl VertexRow {
    pub(super) fn point(&self) -> [f64; 3] {
        self.point
    }

    pub(super) fn extras(&self) -> &[Number] {
        &self.extras
    }

    #[inline]
    fn set(&mut self, name: &str, value: Number) {
        match name {
            "x" => self.point[0] = value.to_f64(),
            "y" => self.point[1] = value.to_f64(),
            "z" => self.point[2] = value.to_f64(),
            _ => self.extras.push(value),
        }
    }
}

impl PropertyAccess for VertexRow {
    fn new() -> Self {
        Self { point: [0.0; 3], extras: Vec::new() }
    }

    scalar_setters!();
}

/// A face: its corners, and its scalars in the header's order.
#[derive(Debug)]
pub(super) struct FaceRow {
    /// Corners of the two usual types; the others are few enough to be widened.
    signed: Vec<i32>,
    unsigned: Vec<u32>,
    extras: Vec<Number>,
}

impl FaceRow {
    /// Hands every corner on, in order, until one is refused.
    #[inline]
    pub(super) fn corners<E>(&self, mut take: impl FnMut(i64) -> Result<(), E>) -> Result<(), E> {
        self.signed.iter().try_for_each(|&corner| take(corner.into()))?;
        self.unsigned.iter().try_for_each(|&corner| take(corner.into()))
    }

    pub(super) fn extras(&self) -> &[Number] {
        &self.extras
    }

    fn set(&mut self, _: &str, value: Number) {
        self.extras.push(value);
    }
}

macro_rules! list_setters {
    ($($setter:ident $type:ty),*) => {
        $(fn $setter(&mut self, name: &str, value: Vec<$type>) -> PropertyAccessResult {
            if !INDEX_LISTS.contains(&name) {
                return PropertyAccessResult::Ignored;
            }
            self.signed = value.into_iter().map(i32::from).collect();
            PropertyAccessResult::Set
        })*
    };
}

impl PropertyAccess for FaceRow {
    fn new() -> Self {
        Self { signed: Vec::new(), unsigned: Vec::new(), extras: Vec::new() }
    }

    scalar_setters!();

    list_setters!(set_list_char i8, set_list_uchar u8, set_list_short i16, set_list_ushort u16);

    #[inline]
    fn begin_list_int(&mut self, name: &str, _: usize) -> BeginList<'_, i32> {
        if INDEX_LISTS.contains(&name) {
            BeginList::Fill(&mut self.signed)
        } else {
            BeginList::UseSetter
        }
    }

    #[inline]
    fn begin_list_uint(&mut self, name: &str, _: usize) -> BeginList<'_, u32> {
        if INDEX_LISTS.contains(&name) {
            BeginList::Fill(&mut self.unsigned)
        } else {
            BeginList::UseSetter
        }
    }
}

/// A row of an element that is read over.
#[derive(Debug)]
pub(super) struct SkippedRow;

impl PropertyAccess for SkippedRow {
    fn new() -> Self {
        Self
    }
}

/// The columns of an element's scalars other than the known ones, filled row by row.
pub(super) struct Columns {
    columns: Vec<AttributeColumn>,
    skipped: Vec<String>,
    element: String,
}

impl Columns {
    pub(super) fn new(element: &ElementDef, known: &[&str]) -> Self {
        let mut columns = Vec::new();
        let mut skipped = Vec::new();
        for property in element.properties.values() {
            if known.contains(&property.name.as_str()) {
                continue;
            }
            match &property.data_type {
                PropertyType::Scalar(scalar) => {
                    columns.push(AttributeColumn::new(property.name.clone(), empty(scalar)));
                }
                PropertyType::List(..) => skipped.push(property.name.clone()),
            }
        }
        Self { columns, skipped, element: element.name.clone() }
    }

    #[inline]
    pub(super) fn push(&mut self, row: &[Number]) {
        for (column, &value) in self.columns.iter_mut().zip(row) {
            push(&mut column.values, value);
        }
    }

    pub(super) fn finish(self, notes: &mut Vec<Note>) -> Vec<AttributeColumn> {
        for name in &self.skipped {
            let message = format!(
                "property `{name}` of element `{}` is a list and was read over",
                self.element
            );
            notes.push(Note::new(NoteKind::Skipped, 1, message));
        }
        self.columns
    }
}

fn empty(scalar: &ScalarType) -> AttributeValues {
    match scalar {
        ScalarType::Char => AttributeValues::I8(Vec::new()),
        ScalarType::UChar => AttributeValues::U8(Vec::new()),
        ScalarType::Short => AttributeValues::I16(Vec::new()),
        ScalarType::UShort => AttributeValues::U16(Vec::new()),
        ScalarType::Int => AttributeValues::I32(Vec::new()),
        ScalarType::UInt => AttributeValues::U32(Vec::new()),
        ScalarType::Float => AttributeValues::F32(Vec::new()),
        ScalarType::Double => AttributeValues::F64(Vec::new()),
    }
}

fn push(values: &mut AttributeValues, value: Number) {
    match (values, value) {
        (AttributeValues::I8(values), Number::I8(x)) => values.push(x),
        (AttributeValues::U8(values), Number::U8(x)) => values.push(x),
        (AttributeValues::I16(values), Number::I16(x)) => values.push(x),
        (AttributeValues::U16(values), Number::U16(x)) => values.push(x),
        (AttributeValues::I32(values), Number::I32(x)) => values.push(x),
        (AttributeValues::U32(values), Number::U32(x)) => values.push(x),
        (AttributeValues::F32(values), Number::F32(x)) => values.push(x),
        (AttributeValues::F64(values), Number::F64(x)) => values.push(x),
        // Column and setter both follow the header's type.
        (values, value) => debug_assert!(false, "{value:?} for {values:?}"),
    }
}
