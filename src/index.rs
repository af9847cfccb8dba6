//! Indices that know what they index, so that a node number cannot be used on cells.

macro_rules! index_type {
    ($(#[$doc:meta])* $name:ident) => {
        $(#[$doc])*
        #[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
        pub struct $name(u32);

        impl $name {
            /// The index numbered `index`.
            ///
            /// # Panics
            /// If `index` does not fit in 32 bits; every list here is limited well below that.
            pub fn new(index: usize) -> Self {
                Self(u32::try_from(index).expect("index fits in 32 bits"))
            }

            /// The number, for slices.
            pub fn index(self) -> usize {
                self.0 as usize
            }
        }
    };
}

index_type!(
    /// The air of one environment; entries that are `same_as` another share its air.
    AirId
);
index_type!(
    /// One entry of `environments:` (a surface rule on some air).
    EnvironmentId
);
index_type!(
    /// A solid of one conductivity and surface class.
    PartId
);
index_type!(
    /// A straight piece of surface with one surface resistance.
    SurfaceId
);
index_type!(
    /// A cell of the grid.
    CellId
);
index_type!(
    /// A node (cell corner) of the grid.
    NodeId
);
index_type!(
    /// A face between two cells, or between a cell and a surface or an adiabatic edge.
    FaceId
);
