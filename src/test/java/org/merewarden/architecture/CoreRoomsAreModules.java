package org.merewarden.architecture;

import java.util.stream.Stream;
import org.springframework.modulith.core.ApplicationModuleDetectionStrategy;
import org.springframework.modulith.core.ApplicationModuleInformation;
import org.springframework.modulith.core.JavaPackage;
import org.springframework.modulith.core.NamedInterfaces;

/**
 * The direct children of the root package are the modules, except that each room of {@code core} is one: the core has
 * no types of its own and is open to the features, but carries no annotation that would say so. The engine inside {@code
 * core.inference} shows its one public type.
 */
public class CoreRoomsAreModules implements ApplicationModuleDetectionStrategy {
    @Override
    public Stream<JavaPackage> getModuleBasePackages(JavaPackage root) {
        return root.getDirectSubPackages().stream()
                .flatMap(room ->
                        room.getLocalName().equals("core") ? room.getDirectSubPackages().stream() : Stream.of(room));
    }

    @Override
    public NamedInterfaces detectNamedInterfaces(JavaPackage base, ApplicationModuleInformation information) {
        return base.getLocalName().equals("inference")
                ? NamedInterfaces.of(base, information)
                        .and(NamedInterfaces.builder(base)
                                .matching("statespace")
                                .build())
                : NamedInterfaces.of(base, information);
    }
}
