package org.whither.film;

/**
 * Numbers that are kept somewhere, in as many bits as they were given in: in an array, or in a file that is mapped into
 * memory. They do not change, and may be asked for from any thread.
 */
public interface Values {
    /** How many there are. */
    int size();

    /** The number at an index. */
    double at(int index);

    /** Numbers in an array; kept, so nobody may change them. */
    static Values of(double[] numbers) {
        return new Values() {
            @Override
            public int size() {
                return numbers.length;
            }

            @Override
            public double at(int index) {
                return numbers[index];
            }
        };
    }

    /** Numbers of 32 bits in an array; kept, so nobody may change them. */
    static Values of(float[] numbers) {
        return new Values() {
            @Override
            public int size() {
                return numbers.length;
            }

            @Override
            public double at(int index) {
                return numbers[index];
            }
        };
    }
}
