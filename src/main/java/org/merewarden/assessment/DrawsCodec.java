package org.merewarden.assessment;

import java.io.ByteArrayInputStream;
import java.io.ByteArrayOutputStream;
import java.io.DataInputStream;
import java.io.DataOutputStream;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.util.zip.DeflaterOutputStream;
import java.util.zip.InflaterInputStream;
import org.merewarden.core.inference.Posterior;

/**
 * Draws as compressed bytes: a format number, draws and seasons, then for each draw MSY, FMSY and shape as doubles,
 * T + 1 biomasses and T fishing mortalities as floats (seven digits; 400 draws of 35 seasons take about 100 kB).
 */
final class DrawsCodec {
    private static final int FORMAT = 1;

    /** The arrays of a posterior, indexed as there. */
    record Draws(double[] msy, double[] fmsy, double[] shape, double[][] biomass, double[][] fishing) {}

    private DrawsCodec() {}

    static byte[] encode(Posterior posterior) {
        var bytes = new ByteArrayOutputStream();
        try (var out = new DataOutputStream(new DeflaterOutputStream(bytes))) {
            out.writeInt(FORMAT);
            out.writeInt(posterior.draws());
            out.writeInt(posterior.seasons());
            for (int i = 0; i < posterior.draws(); i++) {
                out.writeDouble(posterior.msyTonnes()[i]);
                out.writeDouble(posterior.fmsyPerYear()[i]);
                out.writeDouble(posterior.shape()[i]);
                writeFloats(out, posterior.biomassTonnes()[i]);
                writeFloats(out, posterior.fishingPerYear()[i]);
            }
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        return bytes.toByteArray();
    }

    static Draws decode(byte[] bytes) {
        try (var in = new DataInputStream(new InflaterInputStream(new ByteArrayInputStream(bytes)))) {
            int format = in.readInt();
            if (format != FORMAT) {
                throw new IllegalStateException("needs draws of format " + FORMAT + ", got " + format);
            }
            int count = in.readInt();
            int seasons = in.readInt();
            var draws = new Draws(
                    new double[count],
                    new double[count],
                    new double[count],
                    new double[count][seasons + 1],
                    new double[count][seasons]);
            for (int i = 0; i < count; i++) {
                draws.msy()[i] = in.readDouble();
                draws.fmsy()[i] = in.readDouble();
                draws.shape()[i] = in.readDouble();
                readFloats(in, draws.biomass()[i]);
                readFloats(in, draws.fishing()[i]);
            }
            return draws;
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    private static void writeFloats(DataOutputStream out, double[] values) throws IOException {
        for (double value : values) {
            out.writeFloat((float) value);
        }
    }

    private static void readFloats(DataInputStream in, double[] values) throws IOException {
        for (int i = 0; i < values.length; i++) {
            values[i] = in.readFloat();
        }
    }
}
