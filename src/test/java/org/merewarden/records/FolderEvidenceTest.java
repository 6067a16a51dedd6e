package org.merewarden.records;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.stream.Collectors;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.merewarden.WholeApplication;
import org.merewarden.core.evidence.AreaRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.intake.FolderImport;
import org.merewarden.records.FolderEvidence.StockEvidence;
import org.merewarden.waterbody.Register;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.security.test.context.support.WithMockUser;

/** A folder read without a store, against the same folder imported. */
@WholeApplication
class FolderEvidenceTest {
    @TempDir
    Path folder;

    @Autowired
    private FolderImport imports;

    @Autowired
    private EvidenceReader reader;

    @Autowired
    private Register register;

    private void table(String name, String text) throws IOException {
        Files.writeString(folder.resolve(name + ".csv"), text);
    }

    private void everything() throws IOException {
        table("water-bodies", """
                code;name;kind;area_ha;mean_depth_m;dissolved_solids_mg_l;mean_air_temperature_c
                folder-mere;Folder Mere;reservoir;812,5;6,2;;7,25
                folder-fen;Folder Fen;;40;;95;
                """);
        table("stocks", """
                water_body,species,population,recruitment,productivity,max_age_years,share_of_lake_yield
                folder-mere,FPE,deep,,slow,,0.3
                folder-mere,FPE,shore,mixed,,14,
                folder-mere,FPP,,stocked only,,,
                folder-fen,FPE,,,,,
                """);
        table("catches", """
                water_body,species,population,year,sector,catch_t,cv,reported_fraction,source
                folder-mere,FPE,deep,2020,commercial,12.4,0.1,0.9,ledger
                folder-mere,FPE,deep,2021,angling,0,,,
                folder-mere,FPE,shore,2020,,3.3,,,
                folder-fen,FPE,,2019,unlawful,1e-3,,,
                """);
        table("effort", """
                water_body,species,population,year,series,effort,unit
                folder-mere,FPE,shore,2020,net nights,420,nights
                folder-mere,FPE,shore,2021,net nights,0,
                """);
        table("surveys", """
                water_body,species,population,year,series,time_of_year,kind,value,cv,nets
                folder-mere,FPE,deep,2021,multi-mesh,,index,0,,32
                folder-mere,FPE,deep,2022,sonar,0.75,biomass,88.125,0.25,
                """);
        table("events", """
                key,water_body,species,population,year,kind,low,likely,high,number,survival,delay_years,recruit_weight_kg
                folder-kill,folder-mere,,,2020,fish kill,0.1,0.2,0.3,,,,
                folder-fry,folder-mere,FPE,shore,2019,stocking,,,,40000,0.05,2,0.3
                folder-shut,folder-mere,FPE,deep,2021,closure,,0.5,,,,,
                """);
        table("areas", "water_body,year,area_ha\nfolder-mere,2020,700\nfolder-mere,2021,650.5\n");
        table("priors", """
                water_body,species,population,parameter,series,median,log_sd,reason
                folder-mere,FPE,deep,fmsy,,0.24,0.3,"Slow, known from scales"
                folder-mere,FPE,deep,observation_sd,multi-mesh,0.35,0.3,
                folder-mere,FPE,deep,observation_sd,,0.25,0.3,
                """);
    }

    @Test
    @WithMockUser(username = "biologist", roles = "BIOLOGIST")
    void theSameFolderGivesTheSameEvidenceAsImportingIt() throws IOException {
        everything();
        imports.load(folder.toUri().toString(), "test");

        FolderEvidence read = FolderEvidence.read(folder);
        List<StockEvidence> stocks = read.stocks();

        assertThat(stocks.stream().map(s -> s.waterBody() + ":" + s.speciesKey()))
                .containsExactly("folder-fen:FPE", "folder-mere:FPE.deep", "folder-mere:FPE.shore", "folder-mere:FPP");
        for (StockEvidence stock : stocks) {
            long id = register.stock(stock.waterBody(), stock.speciesKey())
                    .orElseThrow()
                    .id();
            Evidence stored = reader.evidence(id);
            assertThat(stock.evidence()).isEqualTo(stored);
            assertThat(stock.evidence().contentHash()).isEqualTo(stored.contentHash());
        }
        Evidence deep = stocks.get(1).evidence();
        assertThat(deep.events()).extracting("key").containsExactly("folder-kill", "folder-shut");
        assertThat(deep.habitat().stocksInLake()).isEqualTo(3);
        assertThat(deep.habitat().kind()).isEqualTo("reservoir");
        assertThat(deep.priors()).hasSize(3);
        assertThat(stocks.get(2).evidence().events().get(0).recruitYear()).isEqualTo(2021);
        assertThat(read.lastSeason()).hasValue(2022);
    }

    @Test
    void withoutATableOfWaterBodiesTheyAreThoseThatStocksName() throws IOException {
        everything();
        Files.delete(folder.resolve("water-bodies.csv"));

        List<StockEvidence> stocks = FolderEvidence.read(folder).stocks();

        assertThat(stocks.stream().map(StockEvidence::waterBody).collect(Collectors.toSet()))
                .containsExactlyInAnyOrder("folder-fen", "folder-mere");
        Evidence deep = stocks.get(1).evidence();
        // the latest season's area stands for the register's
        assertThat(deep.habitat().areaHectares()).isEqualTo(650.5);
        assertThat(deep.areas()).containsExactly(new AreaRecord(2020, 700), new AreaRecord(2021, 650.5));
        assertThat(stocks.get(0).evidence().habitat().areaHectares()).isEqualTo(FolderEvidence.UNKNOWN_AREA_HECTARES);
        assertThat(stocks.get(0).evidence().habitat().meanDepthMetres()).isNull();
    }
}
