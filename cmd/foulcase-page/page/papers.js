// What the page shows at first: a paper of Skarrow Sound Pilots, who do not exist, and
// their house words.

export const paper = `STANDING ORDERS FOR THE NIGHT BOAT
Skarrow Sound Pilots, boarding station at Corran Quay

1. The coxswain calls the station on channel 12 befor the boat leaves the quay, and again when she has past the Gannel Fairway buoy. A call that is not answered within five minutes is repeated; after the the second the duty pilot is woken.

2. Nobody goes forward of the wheelhouse with out a lifejacket and a line. In a steep sea the deckhand holds on with one hand, even if the ladder has to wait. ⚓ The sea wins every argument 🌊 and its patience is beter than ours.

3. The pilot says weather or not the ladder is fit to climb. A ladder that is to short, or that hangs from a damaged shackle, is refused, and the master is told why. We would rather loose an hour than a man.

4. Every defect goes in the log, with the time and the part number (KW-HYD-07B, for instance). The hydralic hose of the bow thruster has been changed alot this year; say so if it weeps again.

5. When the boat is back alongside, the engines are left to cool for ten minutes. The last one ashore checks the heater, switches of the deck lights and locks the store.

Signed: M. Tollgarth, senior pilot
`;

export const houseWords = ["Brackwater", "Corran", "Gannel", "hose", "hoses", "Lisk", "Skarrow", "Tollgarth", "Tolva"];
