//! Numbers from a seed: 64 bits mixed by two multiplications (SplitMix64, Steele, Lea and Flood
//! 2014; constants from memory, and any odd ones would do here).

pub struct Numbers(u64);

impl Numbers {
    /// The numbers of one input of one seed.
    pub fn of(seed: u64, input: u64) -> Self {
        let mut numbers = Self(seed.wrapping_mul(0x9e37_79b9_7f4a_7c15) ^ input);
        numbers.next();
        numbers
    }

    pub fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut mixed = self.0;
        mixed = (mixed ^ (mixed >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        mixed ^ (mixed >> 31)
    }

    /// A number under `below`; 0 where there is none.
    pub fn below(&mut self, below: usize) -> usize {
        if below == 0 {
            return 0;
        }
        usize::try_from(self.next() % below as u64).expect("under a usize")
    }

    /// Once in so many.
    pub fn once_in(&mut self, many: usize) -> bool {
        self.below(many) == 0
    }

    /// One of a list that is not empty.
    pub fn one<'a, T>(&mut self, list: &'a [T]) -> &'a T {
        &list[self.below(list.len())]
    }
}
