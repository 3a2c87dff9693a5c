// Invented people: given and family names are put together by chance, and nobody is meant.
const words = (text: string) => text.trim().split(/\s+/)

export const GIVEN_NAMES = {
  female:
    words(`Abena Ailsa Amara Anouk Beatriz Bronwen Chiara Daniela Delphine Edda Efua Elif Farida Fiona Greta Hanneke Hye-jin Ines Ingrid
    Jasmin Johanna Kalinda Katarzyna Leilani Ligia Lucía Mahsa Marit Mei Nadia Naledi Ngozi Noor Oksana Olwen Parisa Petra Priya Quyen Rania
    Roza Saanvi Safiya Sigrid Soledad Taini Thandi Tova Ursula Valeria Wanjiru Xiomara Yael Yuki Zainab Zofia`),
  male: words(`Adewale Aidan Andrei Arjun Bashir Benedikt Callum Chidi Cyrus Dariusz Diego Eamon Emre Ezra Farhan Faustino Gareth Giorgos Hamid
    Henrik Hiro Idris Ignacio Ivo Jabari Jorge Kaveh Kofi Kwame Lars Lorenzo Luca Mateo Mihai Moses Nikhil Noah Olaf Omar Pavel Piero Quang
    Rafael Ravi Ruben Sanjay Sione Stellan Tariq Teodor Tomasz Umar Viktor Wen Xavier Yusuf Zoltan`),
} as const

export const FAMILY_NAMES =
  words(`Abara Achterberg Adeyemi Almqvist Arslan Aster Bainbridge Balogun Bellweather Bergdahl Bianchini Brannock
  Caldera Castellane Chaudry Cho Cosgrave Cruickshank Dalgaard Darko Delacroix Demirtas Dufresne Eastman Eklund Ellery Espinoza Fairweather Farrow
  Ferreira Fontaine Gallardo Ganesan Garrick Ghorbani Goldthwaite Grünwald Haddad Halloran Hartvig Hasegawa Herrera Holloway Ibarra Ilves Iyer
  Jankowski Jarrah Joubert Kahale Kallio Kamara Kang Karimov Keswick Kowalczyk Kruse Laidlaw Lakshman Larkspur Lindqvist Lovelock Machado Mahlangu
  Malik Marchetti Mbeki-Lowe McAllen Mendoza Moreau Nakagawa Nasser Navarro Nguyen-Hart Novak Obi Odhiambo Okonjo Oliveira Ortega Osei Pacheco
  Papadakis Pasternak Pellegrin Petrov-Lane Quarles Quispe Rahimi Ramanathan Redfern Reyes Rosenthal Rutherglen Sabatini Salazar Sandoval Sato
  Schofield Serrano Shimizu Silvestri Sorensen Stavros Szabo Takahashi Tamarind Tesfaye Thackeray Tran-Moss Ulvaeus Umarov Valdez Vandermeer Vasquez
  Velasco Villanueva Wakefield Warsame Whitlock Wójcik Yamada Yilmaz Zamora Zhao Zielinski`)
